/** How the file writes decimals; 'unclear' when some cells have a comma and others a point. */
export type Decimals = 'point' | 'comma' | 'unclear';

/** A number as it was meant, with how it was written where that is not plain; or why there is none. */
export type NumberCell = { value: number; asWritten?: string } | { fault: string };

type Unit = { shown: string; factors: Record<string, number> };

const MA: Unit = { shown: 'mA', factors: { ma: 1, a: 1000, µa: 0.001, μa: 0.001, ua: 0.001 } };

/** Units that may stand behind a number, by how the field's name ends. */
const UNITS: [ending: RegExp, unit: Unit][] = [
  [/Ma$/, MA],
  [/Volts$/, { shown: 'V', factors: { v: 1, volt: 1, volts: 1, mv: 0.001 } }],
  [/Hours$/, { shown: 'h', factors: { h: 1, hr: 1, hour: 1, hours: 1, min: 1 / 60 } }],
  [/Deg$/, { shown: '°', factors: { '°': 1, deg: 1 } }],
  [/Lux$/, { shown: 'lx', factors: { lx: 1, lux: 1 } }],
  [/Share$/, { shown: '', factors: { '%': 0.01 } }],
  [/seconds$/, { shown: 's', factors: { s: 1, sec: 1, seconds: 1, min: 60 } }],
  [/[a-z]C$/, { shown: '°C', factors: { '°c': 1, c: 1, k: 1 } }],
  [/[xy]M$/, { shown: 'm', factors: { m: 1, cm: 0.01, km: 1000 } }],
];
const NO_UNIT: Unit = { shown: '', factors: {} };

const NUMBER =
  /^(~|≈|ca\.?|about|approx\.?)?\s*([+-]?(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:e[+-]?\d+)?)\s*([^\d\s.,]*)$/i;
const COMMA_DECIMAL = /\d,\d/;
const POINT_DECIMAL = /\d\.\d/;
// Three digits behind the only mark may be decimals, or thousands.
const MAYBE_THOUSANDS = /^[+-]?[1-9]\d{0,2}[.,]\d{3}$/;

/**
 * How a file writes its decimals. A comma counts only where it does not part the columns.
 * @param separator what parts the columns
 * @param cells every cell that should hold a number
 */
export function decimalsOf(separator: string, cells: Iterable<string>): Decimals {
  if (separator === ',') return 'point';
  let comma = false;
  let point = false;
  for (const cell of cells) {
    comma ||= COMMA_DECIMAL.test(cell);
    point ||= POINT_DECIMAL.test(cell);
  }
  return comma && point ? 'unclear' : comma ? 'comma' : 'point';
}

/**
 * Reads a cell that should hold a number: '3.3', '3,3', '~20mA', '0.022 A', '60 %'.
 * @param text not empty, without blanks around it
 * @param of.field name of the field, whose ending says the unit
 * @param of.decimals how the file writes decimals
 * @param of.separator what parts the file's columns
 */
export function readNumberCell(
  text: string,
  of: { field: string; decimals: Decimals; separator: string },
): NumberCell {
  const unit = UNITS.find(([ending]) => ending.test(of.field))?.[1] ?? NO_UNIT;
  const shown = `"${text.slice(0, 40)}"`;
  const match = NUMBER.exec(text.replace('\u2212', '-'));
  const [, about, digits, unitText = ''] = match ?? [];
  if (!digits) return { fault: notANumber(text, unit) };
  if (digits.includes(',') && of.separator === ',')
    return {
      fault: `${shown} has a comma, and commas part the columns of this file: ${digits.replace(',', '.')}, or two cells run together? Write a point, or part the columns with ";".`,
    };
  if (of.decimals !== 'point' && MAYBE_THOUSANDS.test(digits) && isOtherMark(digits, of.decimals))
    return {
      fault: `${shown} may be ${digits.replace(',', '.')} or ${digits.replace(/[.,]/, '')}: other cells of this file write decimals with another mark. Write all decimals alike and no mark for thousands.`,
    };
  const factor = unitText === '' ? 1 : unit.factors[unitText.toLowerCase()];
  if (factor === undefined) return { fault: otherUnit(shown, unitText, unit) };
  const number = Number(digits.replace(',', '.'));
  if (!Number.isFinite(number)) return { fault: `${shown} is larger than any number here.` };
  const value = factor === 1 ? number : Number((number * factor).toPrecision(12));
  const isPlain = !about && unitText === '';
  return isPlain ? { value } : { value, asWritten: `${shown} was read as ${value} ${unit.shown}`.trim() };
}

function isOtherMark(digits: string, decimals: Decimals): boolean {
  return decimals === 'unclear' || digits.includes('.');
}

function notANumber(text: string, { shown }: Unit): string {
  const unit = shown === '' ? '' : ` The unit is ${shown}, and may be left out.`;
  return `"${text.slice(0, 40)}" is not a number. Write digits alone, or leave the cell empty.${unit}`;
}

function otherUnit(shown: string, given: string, unit: Unit): string {
  if (unit === MA && /^mah?h$|^ah$/i.test(given))
    return `${shown}: ${given} is how much a cell holds. Give the current that a meter reads while it is lit, in mA.`;
  const wanted = unit.shown === '' ? 'a number without a unit' : unit.shown;
  return `${shown} is in ${given.slice(0, 10)}, and ${wanted} is wanted here.`;
}
