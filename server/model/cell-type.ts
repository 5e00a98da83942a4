/** Chemistry in plain words. */
export type CellKind =
  | 'alkaline'
  | 'zinc-carbon'
  | 'lithium-aa'
  | 'nickel'
  | 'nickel-standard'
  | 'lithium-ion'
  | 'lithium-iron'
  | 'coin'
  | 'lead';

/** A sort of cell (or factory-made block) as one buys it. */
export type CellType = {
  /** IEC designation for built-in ones ('LR6'). */
  id: string;
  name: string;
  kind: CellKind;
  /** Label or measured capacity at 20 °C and a light load, mAh. */
  capacityMah: number;
  nominalVolts: number;
  /** Cells inside a factory-made block (6LR61 has six), else 1. */
  cellsInside: number;
  priceEach?: number;
  massG: number;
  rechargeable: boolean;
  builtIn: boolean;
};
