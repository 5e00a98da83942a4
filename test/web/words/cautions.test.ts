import { describe, expect, it } from 'vitest';
import { CellType } from '../../../server/http/schemas/cell-types.ts';
import { cautionsFor, REMINDER, SITE_CAUTIONS } from '../../../web/words/cautions.ts';

const kinds = (CellType.properties.kind as unknown as { enum: Parameters<typeof cautionsFor>[0][] }).enum;
const three = { series: 3, parallel: 1 };

describe('cautions', () => {
  it('has some for every kind of cells the service knows', () => {
    expect(kinds.length).toBeGreaterThan(5);
    for (const kind of kinds) expect(cautionsFor(kind, three).length, kind).toBeGreaterThan(0);
  });

  // IEC and fire-service advice, as in USFA "Lithium-ion battery safety": charge at 0 to 40 °C, never unattended.
  it('tells lithium-ion not to be charged in the cold', () => {
    expect(cautionsFor('lithium-ion', three).join(' ')).toMatch(/0 and 40 °C.*unattended/);
  });

  // Poison-centre advice: injury within two hours, emergency care at once.
  it('puts the emergency first for coin cells', () => {
    expect(cautionsFor('coin', three)[0]).toMatch(/two hours.*emergency care at once/);
  });

  it('does not warn one single cell of being mixed', () => {
    expect(cautionsFor('alkaline', { series: 1, parallel: 1 }).join(' ')).not.toMatch(/together/);
    expect(cautionsFor('alkaline', three).join(' ')).toMatch(/together/);
  });

  it('never promises', () => {
    expect(REMINDER).toMatch(/not assurance/);
    expect(SITE_CAUTIONS.join(' ')).toMatch(/find the way by a decoration/);
  });
});
