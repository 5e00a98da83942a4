import { type Static, Type } from 'typebox';
import { closed, Id, number, oneOf, text, whole } from './fields.ts';

const fields = {
  name: text(120),
  kind: oneOf(
    [
      'alkaline',
      'zinc-carbon',
      'lithium-aa',
      'nickel',
      'nickel-standard',
      'lithium-ion',
      'lithium-iron',
      'coin',
      'lead',
    ],
    {
      slip: 'Say which chemistry: cells that came with a decoration may be zinc-carbon, good for about a third of the hours of alkaline.',
    },
  ),
  capacityMah: number(1, 1_000_000, { slip: 'mAh of one cell. Cells end to end add volts, not mAh.' }),
  nominalVolts: number(0.5, 48),
  cellsInside: whole(1, 24, { description: 'Cells inside a factory-made block: six in a 9 V block.' }),
  priceEach: number(0, 100_000),
  massG: number(0, 100_000),
  rechargeable: Type.Boolean(),
};

export const CellType = Type.Object(
  { id: Id, ...fields, priceEach: Type.Optional(fields.priceEach), builtIn: Type.Boolean() },
  { $id: 'CellType' },
);
export const NewCellType = Type.Object(
  {
    id: Type.Optional(Id),
    name: Type.Optional(fields.name),
    kind: fields.kind,
    capacityMah: fields.capacityMah,
    nominalVolts: fields.nominalVolts,
    cellsInside: Type.Optional(fields.cellsInside),
    priceEach: Type.Optional(fields.priceEach),
    massG: fields.massG,
    rechargeable: Type.Optional(fields.rechargeable),
  },
  closed,
);
export const CellTypeChanges = Type.Object(
  {
    name: Type.Optional(fields.name),
    capacityMah: Type.Optional(fields.capacityMah),
    nominalVolts: Type.Optional(fields.nominalVolts),
    cellsInside: Type.Optional(fields.cellsInside),
    priceEach: Type.Optional(fields.priceEach),
    massG: Type.Optional(fields.massG),
    rechargeable: Type.Optional(fields.rechargeable),
  },
  closed,
);

export type CellType = Static<typeof CellType>;
export type NewCellType = Static<typeof NewCellType>;
export type CellTypeChanges = Static<typeof CellTypeChanges>;
