import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { CycleEnergy, EnergyFigure } from '#shared/ledger/cycle.ts';
import { wh } from '#shared/units/energy.ts';
import { energyBars, missingEnergy } from '#src/features/cycles/energy-bars.ts';

function figure(amount: number): EnergyFigure {
  return {
    wh: wh(amount),
    from: 'register',
    coverage: 1,
    working: { words: 'read', formula: 'read', inputs: [], unit: 'kWh', basis: 'metered' },
  };
}

function energy(bought: number, sent: number, selfUse: number): CycleEnergy {
  return {
    import: figure(bought),
    export: figure(sent),
    production: figure(sent + selfUse),
    selfUse: figure(selfUse),
    use: figure(bought + selfUse),
  };
}

const amount = fc.integer({ min: 0, max: 3_000_000 });

describe('where the energy went', () => {
  it('draws self-use exactly above itself: the roof begins where what was bought ends', () => {
    fc.assert(
      fc.property(amount, amount, amount, (bought, sent, selfUse) => {
        fc.pre(bought + sent + selfUse > 0);
        const bars = energyBars(energy(bought, sent, selfUse));
        const inHouse = bars?.house.find((part) => part.key === 'bought')?.share ?? 0;
        expect(bars?.offset).toBeCloseTo(inHouse, 9);
        const above = bars?.roof.find((part) => part.key === 'selfUse')?.share;
        const below = bars?.house.find((part) => part.key === 'fromRoof')?.share;
        expect(above).toBe(below);
      }),
    );
  });

  it('never runs past the end of its scale', () => {
    fc.assert(
      fc.property(amount, amount, amount, (bought, sent, selfUse) => {
        fc.pre(bought + sent + selfUse > 0);
        const bars = energyBars(energy(bought, sent, selfUse));
        const end = (bars?.offset ?? 0) + (bars?.roof ?? []).reduce((sum, part) => sum + part.share, 0);
        expect(end).toBeLessThanOrEqual(1 + 1e-9);
      }),
    );
  });

  it('says what is missing and never draws it as zero', () => {
    const known: CycleEnergy = { ...energy(400_000, 0, 0), production: null, selfUse: null, use: null, export: null };
    expect(energyBars(known)?.roof).toEqual([]);
    expect(missingEnergy(known)).toHaveLength(2);
    expect(energyBars({ import: null, export: null, production: null, selfUse: null, use: null })).toBeNull();
  });

  it('names a part under the bars when it is too narrow for its label', () => {
    const bars = energyBars(energy(1_000_000, 10_000, 300_000));
    expect(bars?.legend.find((part) => part.key === 'sentOut')?.narrow).toBe(true);
    expect(bars?.legend.find((part) => part.key === 'bought')?.narrow).toBe(false);
  });
});
