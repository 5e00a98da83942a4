import { PROP_COLUMNS } from '../exchange/props-csv.ts';
import type { CellRemark, PropsFile } from '../exchange/read-props-csv.ts';
import { didYouMean, nearNames } from './near-names.ts';

/**
 * What is wrong with a file's headings: no tag, or a heading that is nearly a field's, whose column would be lost.
 * @param file as it was read
 */
export function columnFaults(file: PropsFile): CellRemark[] {
  const row = file.headingRow;
  const free = PROP_COLUMNS.filter((field) => !file.fields.includes(field));
  const faults: CellRemark[] = [];
  for (const heading of file.strangers) {
    const near = nearNames(heading, free, 1);
    if (near.length === 0) continue;
    const message = `${JSON.stringify(heading.slice(0, 40))} is no column here.${didYouMean(near)} Name it so, or otherwise to have it left aside.`;
    faults.push({ row, field: heading.slice(0, 60), message });
  }
  if (!file.fields.includes('tag')) {
    const message = `There is no column "tag", and the tag says which prop a row is about.${nearest('tag', file)}`;
    faults.push({ row, field: 'tag', message });
  }
  return faults;
}

/**
 * One sentence for a column that is missing, instead of one for every row.
 * @param file as it was read
 * @param missing how many rows need each missing field
 */
export function missingColumnFaults(file: PropsFile, missing: ReadonlyMap<string, number>): CellRemark[] {
  return [...missing].map(([field, rows]) => {
    const who = rows === 1 ? 'one row needs' : `${rows} rows need`;
    const message = `There is no column "${field}", and ${who} it.${WORDS[field] ?? ''}${nearest(field, file)}`;
    return { row: file.headingRow, field, message };
  });
}

/** What belongs into the columns a new prop cannot do without. */
const WORDS: Record<string, string> = {
  name: ' What people call it.',
  zone: ' The part of the site it stands in.',
  cellTypeId: ' Which cells it takes, like LR6; a column "cells" with "3xAA" does too.',
  series: ' How many cells stand end to end in one set.',
  dimVolts: ' The volts of the whole lit set at which it looks dim.',
  'load.behaviour': ' steady, fades or holds: what the draw does as the set falls.',
  'switching.kind': ' light-sensor, clock, interval-timer, by-hand or always.',
};

function nearest(field: string, file: PropsFile): string {
  const [near] = nearNames(field, file.strangers, 1);
  return near === undefined ? '' : ` Is it the column "${near.slice(0, 40)}"?`;
}
