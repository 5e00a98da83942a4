import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { packageRoot } from '../../server/config.ts';
import type { Evening, Instant } from '../../server/model/evening.ts';
import type { Place } from '../../server/model/sun.ts';

export type TableNight = {
  name: string;
  place: Place;
  evening: Evening;
  altitudeDeg: number;
  dusk: string;
  dawn: string;
  darkSeconds: number;
  toleranceSeconds: number;
};

export type GrazingNight = {
  name: string;
  place: Place;
  evening: Evening;
  altitudeDeg: number;
  state: string;
  crossings: { sense: 'd' | 'u'; at: Instant; degPerHour: number }[];
};

/** Rows of a comma-separated table in test/reference/data without quotes, as records by column name. */
export function rowsOf(file: string): Record<string, string>[] {
  const text = readFileSync(join(packageRoot(), 'test', 'reference', 'data', file), 'utf8');
  const [head, ...lines] = text.trim().split(/\r?\n/);
  const names = head!.split(',');
  return lines.map((line) => {
    const values = line.split(',');
    return Object.fromEntries(names.map((name, index) => [name, values[index] ?? '']));
  });
}

function nightOfRow(row: Record<string, string>) {
  return {
    name: `${row.place} ${row.evening_date} ${row.altitude_deg}`,
    place: { latitudeDeg: Number(row.lat), longitudeDeg: Number(row.lon), timeZone: row.tz! },
    evening: row.evening_date!,
    altitudeDeg: Number(row.altitude_deg),
  };
}

/** The 1120 nights of dusk-dawn.csv. */
export function tableNights(): TableNight[] {
  return rowsOf('dusk-dawn.csv').map((row) => ({
    ...nightOfRow(row),
    dusk: row.dusk_utc!,
    dawn: row.dawn_utc!,
    darkSeconds: Number(row.dark_seconds),
    // Nights without a crossing carry none.
    toleranceSeconds: Number(row.tolerance_s) || 5,
  }));
}

/** The 130 nights of dusk-dawn-grazing.csv. */
export function grazingNights(): GrazingNight[] {
  return rowsOf('dusk-dawn-grazing.csv').map((row) => {
    const rates = row.rates_deg_per_h!.split(' ').map(Number);
    const crossings = row.crossings_utc!.split(' ').filter((text) => text !== '');
    return {
      ...nightOfRow(row),
      state: row.state!.replace(' ', '-'),
      crossings: crossings.map((text, index) => ({
        sense: text[0] as 'd' | 'u',
        at: Date.parse(text.slice(2)),
        degPerHour: Math.abs(rates[index]!),
      })),
    };
  });
}
