import { builtInCellType } from '../model/cell-types-built-in.ts';

/** A set as people write it down, read: '3xAA ~20mA' is three LR6 end to end and a draw of '~20mA'. */
export type CellsText = {
  cellTypeId: string;
  /** Cells end to end, where a number was given. */
  series?: number;
  /** Whatever stood behind the cells, as '~20mA'. */
  draw?: string;
  /** Whether the chemistry was not said, so that the commonest was taken. */
  assumedAlkaline: boolean;
};

// What shops call a size, and the numbers of its kinds by IEC 60086.
const SIZES: Record<string, string> = { aaa: '03', aa: '6', c: '14', d: '20' };
const KINDS: [word: RegExp, prefix: string][] = [
  [/^(alkaline|alk\.?)$/, 'LR'],
  [/^(zinc|zinc-carbon|zinc carbon|heavy duty)$/, 'R'],
  [/^(lithium)$/, 'FR'],
  [/^(nickel|nimh|ni-mh|rechargeable)$/, 'HR'],
];
const DRAW = /^(.*?\S)[\s,;/]+((?:~|≈|ca\.? ?|about )?\s*[\d.,]+\s*(?:µ|μ|u|m)?A)$/i;
const COUNT_FIRST = /^(\d{1,2})\s*[x×*]?\s+(.+)$|^(\d{1,2})\s*[x×*]\s*(.+)$/i;
const COUNT_LAST = /^(.+?)\s*[x×*]\s*(\d{1,2})$/i;

/**
 * Reads cells written in words.
 * @param text as 'AA', '3xAA', '3 × AA zinc-carbon', 'CR2032', '3xAA ~20mA'
 * @returns null when it names no cells we know
 */
export function readCellsText(text: string): CellsText | null {
  const plain = text.trim().replace(/\s+/g, ' ');
  const withDraw = DRAW.exec(plain);
  const cells = withDraw?.[1] ?? plain;
  const first = COUNT_FIRST.exec(cells);
  const last = first ? null : COUNT_LAST.exec(cells);
  const count = first?.[1] ?? first?.[3] ?? last?.[2];
  const type = cellTypeNamed((first?.[2] ?? first?.[4] ?? last?.[1] ?? cells).trim());
  if (!type) return null;
  return {
    ...type,
    ...(count === undefined ? {} : { series: Number(count) }),
    ...(withDraw ? { draw: withDraw[2]! } : {}),
  };
}

function cellTypeNamed(name: string): { cellTypeId: string; assumedAlkaline: boolean } | null {
  const upper = name.toUpperCase().replace(/ /g, '');
  if (builtInCellType(upper)) return { cellTypeId: upper, assumedAlkaline: false };
  const words = name
    .toLowerCase()
    .replace(/ (cells?|batter(y|ies))$/, '')
    .split(' ');
  const size = SIZES[words[0]!] === undefined ? SIZES[words.at(-1)!] : SIZES[words[0]!];
  if (size === undefined) return null;
  const kind = (SIZES[words[0]!] === undefined ? words.slice(0, -1) : words.slice(1)).join(' ');
  const prefix = kind === '' ? 'LR' : KINDS.find(([word]) => word.test(kind))?.[1];
  const cellTypeId = `${prefix}${size}`;
  if (prefix === undefined || !builtInCellType(cellTypeId)) return null;
  return { cellTypeId, assumedAlkaline: kind === '' };
}
