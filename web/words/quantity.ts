/** Numbers as people say them: two figures where the third would be false comfort. */

/** 2 or 3 figures, no trailing zeros: 0.022, 1.5, 21, 640. */
export function figures(value: number, count = 3): string {
  if (value === 0) return '0';
  const rounded = Number(value.toPrecision(count));
  return Math.abs(rounded) >= 1000 ? String(Math.round(value)) : String(rounded);
}

const minus = (text: string) => text.replace('-', '\u2212');

export const ma = (valueMa: number) => `${figures(valueMa)} mA`;
export const mah = (valueMah: number) =>
  `${Math.abs(valueMah) >= 10 ? Math.round(valueMah) : figures(valueMah, 2)} mAh`;
export const volts = (valueVolts: number) => `${figures(valueVolts)} V`;
export const hours = (valueHours: number) => `${minus(valueHours.toFixed(1))} h`;
export const degrees = (valueC: number) => `${minus(String(Math.round(valueC) || 0))} °C`;
/** A share in percent; a chance never reads as a certainty. */
export const percent = (share: number) => `${Math.round(share * 100)} %`;
export function chanceWords(chance: number): string {
  if (chance > 0.99) return 'over 99 %';
  if (chance < 0.01) return 'under 1 %';
  return percent(chance);
}

export const counted = (count: number, one: string, many = `${one}s`) =>
  `${count} ${count === 1 ? one : many}`;

/** 3 end to end, two rows: '3', '8 (2 rows of 4)'. */
export function wiringWords(series: number, parallel: number): string {
  if (series * parallel === 1) return 'one cell';
  if (parallel === 1) return `${series} cells end to end`;
  if (series === 1) return `${parallel} cells side by side`;
  return `${series * parallel} cells: ${parallel} rows of ${series}`;
}

/**
 * The number somebody typed, or null. Takes a decimal comma and a real minus sign.
 * @param text '2,4', ' -3 ', '−4.5'
 */
export function readNumber(text: string): number | null {
  const plain = text.trim().replace('\u2212', '-').replace(',', '.');
  if (!/^[+-]?(\d+\.?\d*|\.\d+)$/.test(plain)) return null;
  return Number(plain);
}

/** Numbers out of a pasted row: parted by tabs, blanks or semicolons, or by commas where nothing else parts them. */
export function splitNumbers(text: string): string[] {
  const plain = text.trim().replaceAll('\u2212', '-');
  const parted = /[\s;]/.test(plain) ? plain.split(/[\s;]+/) : plain.split(',');
  return parted.map((part) => part.replace(/,$/, '')).filter((part) => part !== '');
}

/** 'Mill Race: -3', one a line. @returns the offsets by zone, °C, and the lines that could not be read */
export function readOffsets(text: string): { offsets: Record<string, number>; unread: string[] } {
  const offsets: Record<string, number> = {};
  const unread: string[] = [];
  for (const line of text.split('\n').map((one) => one.trim())) {
    const match = /^(.*\S)\s*[:=]\s*(\S+)$/.exec(line);
    const offsetC = match ? readNumber(match[2]!) : null;
    if (match && offsetC !== null) offsets[match[1]!] = offsetC;
    else if (line !== '') unread.push(line);
  }
  return { offsets, unread };
}
