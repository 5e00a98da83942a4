import type { CellKind, CellType } from './cell-type.ts';
import { peukertHours } from './peukert.ts';

/** Share of the label capacity a cell gives at 20 °C by current through it, mA ascending. */
export type RateTable = { ma: readonly number[]; share: readonly number[] };

type Row = [
  id: string,
  name: string,
  kind: CellKind,
  capacityMah: number,
  nominalVolts: number,
  cellsInside: number,
  massG: number,
  rate: RateTable,
];

const flat: RateTable = { ma: [1], share: [1] };
/** Lithium-ion and lithium iron: C/10, C/5, C/2 and 1C. Source: from memory of typical data sheets. */
const lithiumRate = (capacityMah: number): RateTable => ({
  ma: [capacityMah / 10, capacityMah / 5, capacityMah / 2, capacityMah],
  share: [1, 0.99, 0.97, 0.93],
});
/** A maker's constant-current table of a 12 V 14 Ah block: hours, A. The 2.3 Ah block's has the same exponents. */
const LEAD_TABLE = [
  { hours: 20, amperes: 0.69 },
  { hours: 10, amperes: 1.3 },
  { hours: 5, amperes: 2.28 },
  { hours: 1, amperes: 7.84 },
];
/** Exponent between the 20 h and the 10 h row, carried on to slower discharges; the gain is capped there (estimate). */
const LEAD_SLOW_EXPONENT = 1.094;
const LEAD_SLOW_GAIN = 1.08;

/** Sealed lead as shares of the 20 h capacity: the maker's rows, and Peukert's law below the 20 h current. */
function leadRate(twentyHourMah: number): RateTable {
  const ratedMa = twentyHourMah / 20;
  const slow = [0.4, 0.55, 0.75].map((part) => {
    const ma = ratedMa * part;
    const hours = peukertHours({ ratedMah: twentyHourMah, ratedHours: 20, ma, exponent: LEAD_SLOW_EXPONENT });
    return { ma, share: Math.min(LEAD_SLOW_GAIN, (ma * hours) / twentyHourMah) };
  });
  const ratedAmperes = LEAD_TABLE[0]!.amperes;
  const rows = LEAD_TABLE.map(({ hours, amperes }) => ({
    ma: (ratedMa * amperes) / ratedAmperes,
    share: (hours * amperes) / (20 * ratedAmperes),
  }));
  const all = [...slow, ...rows];
  return { ma: all.map((row) => row.ma), share: all.map((row) => row.share) };
}

const ROWS: Row[] = [
  [
    'LR6',
    'AA alkaline',
    'alkaline',
    2500,
    1.5,
    1,
    23,
    { ma: [25, 50, 100, 250, 500, 1000], share: [1, 0.98, 0.95, 0.78, 0.57, 0.39] },
  ],
  [
    'LR03',
    'AAA alkaline',
    'alkaline',
    1200,
    1.5,
    1,
    12,
    { ma: [20, 50, 100, 250, 500], share: [1, 0.96, 0.87, 0.66, 0.45] },
  ],
  [
    'LR14',
    'C alkaline',
    'alkaline',
    7500,
    1.5,
    1,
    68,
    { ma: [25, 100, 250, 400], share: [1, 0.95, 0.82, 0.71] },
  ],
  [
    'LR20',
    'D alkaline',
    'alkaline',
    17000,
    1.5,
    1,
    140,
    { ma: [25, 100, 250, 500, 600], share: [1, 0.95, 0.83, 0.66, 0.58] },
  ],
  ['LR1', 'N alkaline', 'alkaline', 850, 1.5, 1, 9, { ma: [10, 25, 50, 100], share: [1, 0.96, 0.88, 0.72] }],
  ['6LR61', '9 V alkaline', 'alkaline', 580, 9, 6, 46, { ma: [27, 35, 85], share: [1, 0.99, 0.62] }],
  [
    'R6',
    'AA zinc-carbon',
    'zinc-carbon',
    900,
    1.5,
    1,
    16,
    { ma: [5, 15, 30, 100], share: [1, 0.9, 0.75, 0.5] },
  ],
  [
    'R03',
    'AAA zinc-carbon',
    'zinc-carbon',
    420,
    1.5,
    1,
    9,
    { ma: [2, 10, 20, 50], share: [1, 0.85, 0.65, 0.4] },
  ],
  ['R14', 'C zinc-carbon', 'zinc-carbon', 2300, 1.5, 1, 47, { ma: [20, 50, 100], share: [1, 0.9, 0.75] }],
  ['R20', 'D zinc-carbon', 'zinc-carbon', 5000, 1.5, 1, 95, { ma: [50, 100, 250], share: [1, 0.92, 0.7] }],
  ['6F22', '9 V zinc-carbon', 'zinc-carbon', 300, 9, 6, 37, { ma: [5, 10, 20], share: [1, 0.9, 0.75] }],
  [
    'FR6',
    'AA lithium, single-use',
    'lithium-aa',
    3200,
    1.5,
    1,
    15,
    { ma: [300, 500, 1000], share: [1, 0.99, 0.96] },
  ],
  [
    'FR03',
    'AAA lithium, single-use',
    'lithium-aa',
    1200,
    1.5,
    1,
    7.6,
    { ma: [100, 250, 500], share: [1, 0.98, 0.93] },
  ],
  [
    'HR6',
    'AA nickel, low self-discharge',
    'nickel',
    1950,
    1.2,
    1,
    27,
    { ma: [20, 300, 500, 1000], share: [1, 0.99, 0.97, 0.92] },
  ],
  [
    'HR6-2450',
    'AA nickel, high capacity',
    'nickel-standard',
    2450,
    1.2,
    1,
    30,
    { ma: [20, 300, 500, 1000], share: [1, 0.99, 0.98, 0.96] },
  ],
  [
    'HR03',
    'AAA nickel, low self-discharge',
    'nickel',
    780,
    1.2,
    1,
    12,
    { ma: [10, 100, 200, 400], share: [1, 0.99, 0.97, 0.93] },
  ],
  ['HR14', 'C nickel', 'nickel', 4000, 1.2, 1, 80, { ma: [50, 1000], share: [1, 0.97] }],
  ['HR20', 'D nickel', 'nickel', 8000, 1.2, 1, 165, { ma: [50, 2000], share: [1, 0.97] }],
  ['ICR18650', '18650 lithium-ion, 2600', 'lithium-ion', 2550, 3.6, 1, 46, lithiumRate(2550)],
  ['INR18650', '18650 lithium-ion, 3400', 'lithium-ion', 3300, 3.6, 1, 47, lithiumRate(3300)],
  ['INR21700', '21700 lithium-ion, 4800', 'lithium-ion', 4750, 3.6, 1, 69, lithiumRate(4750)],
  ['INR21700-5000', '21700 lithium-ion, 5000', 'lithium-ion', 5000, 3.6, 1, 69, lithiumRate(5000)],
  ['IFR18650', '18650 lithium iron', 'lithium-iron', 1500, 3.2, 1, 41, lithiumRate(1500)],
  ['IFR26650', '26650 lithium iron', 'lithium-iron', 2300, 3.2, 1, 85, lithiumRate(2300)],
  ['IFR14500', '14500 lithium iron', 'lithium-iron', 600, 3.2, 1, 16, lithiumRate(600)],
  ['IFR12V7', '12 V lithium iron pack, 7.5 Ah', 'lithium-iron', 7500, 12.8, 4, 950, lithiumRate(7500)],
  [
    'CR2032',
    'Coin, 20 mm',
    'coin',
    225,
    3,
    1,
    3,
    { ma: [0.2, 0.5, 1, 2.6, 5, 10], share: [1, 0.97, 0.92, 0.83, 0.6, 0.35] },
  ],
  ['CR2025', 'Coin, 20 mm thin', 'coin', 160, 3, 1, 2.5, { ma: [0.19, 2.6], share: [1, 0.84] }],
  ['PB12V1', '12 V sealed lead, 1.2 Ah', 'lead', 1200, 12, 6, 580, leadRate(1200)],
  ['PB12V2', '12 V sealed lead, 2.3 Ah', 'lead', 2260, 12, 6, 950, leadRate(2260)],
  ['PB12V4', '12 V sealed lead, 4.5 Ah', 'lead', 4500, 12, 6, 1500, leadRate(4500)],
  ['PB12V7', '12 V sealed lead, 7 Ah', 'lead', 7000, 12, 6, 2400, leadRate(7000)],
  ['PB12V14', '12 V sealed lead, 14 Ah', 'lead', 13800, 12, 6, 4200, leadRate(13800)],
  ['PB6V4', '6 V sealed lead, 4.5 Ah', 'lead', 4500, 6, 3, 750, leadRate(4500)],
];

const RECHARGEABLE: ReadonlySet<CellKind> = new Set([
  'nickel',
  'nickel-standard',
  'lithium-ion',
  'lithium-iron',
  'lead',
]);

export const isRechargeable = (kind: CellKind): boolean => RECHARGEABLE.has(kind);

/** The cells one can buy everywhere, by IEC designation. Masses: maker sheets and common practice. */
export const BUILT_IN_CELL_TYPES: readonly CellType[] = ROWS.map(
  ([id, name, kind, capacityMah, nominalVolts, cellsInside, massG]) => ({
    id,
    name,
    kind,
    capacityMah,
    nominalVolts,
    cellsInside,
    massG,
    rechargeable: isRechargeable(kind),
    builtIn: true,
  }),
);

const byId = new Map(BUILT_IN_CELL_TYPES.map((type) => [type.id, type]));

/** A built-in cell type by its id ('LR6'); null when there is none. */
export function builtInCellType(id: string): CellType | null {
  return byId.get(id) ?? null;
}

/**
 * Rate table of a cell type. An own type borrows that of the built-in cell of its kind whose capacity is
 * nearest, with the currents scaled by capacity. Ours: cells of one chemistry behave alike at the same hours-rate.
 */
export function rateTableOf(type: CellType): RateTable {
  const own = ROWS.find(([id]) => id === type.id);
  if (own && type.builtIn) return own[7];
  let nearest: Row | null = null;
  for (const row of ROWS) {
    if (row[2] !== type.kind) continue;
    const distance = Math.abs(Math.log(row[3] / type.capacityMah));
    if (!nearest || distance < Math.abs(Math.log(nearest[3] / type.capacityMah))) nearest = row;
  }
  if (!nearest) return flat;
  const scale = type.capacityMah / nearest[3];
  return { ma: nearest[7].ma.map((ma) => ma * scale), share: nearest[7].share };
}
