import { kwhInput, plainInput, rule, stated } from '../books/inputs.ts';
import type { GridFactor } from '../facts/household.ts';
import { sayCount } from '../ledger/say.ts';
import { sumWh, type Wh } from '../units/energy.ts';
import { Exact, exact, kwhOf } from '../units/rate.ts';
import type { FigureBasis } from '../working.ts';
import type { ProjectionBasis } from './basis.ts';
import type { Carbon, PlainFigure } from './outlook.ts';
import { projectParts } from './project.ts';

/** Kilograms in a pound, exactly (international avoirdupois pound; NIST Special Publication 811, from memory). */
const KG_PER_LB = '0.45359237';

/** Production × the published factor. A cycle without production is missing, not zero, and is named beside the figure. */
export function carbonOf(basis: ProjectionBasis): Carbon {
  const { grid } = basis.facts.assumptions;
  const known = basis.cycles.flatMap(({ productionWh }) => (productionWh === null ? [] : [productionWh]));
  const parts = projectParts(basis);
  const missingCycles = basis.cycles.length - known.length;
  return {
    factor: grid,
    toDate:
      known.length === 0
        ? null
        : avoided(grid, sumWh(known), `Production of ${sayCount(known.length, 'cycle', 'cycles')}`, 'computed'),
    projected: parts.ok
      ? avoided(
          grid,
          sumWh(parts.energies.map((energy) => energy.productionWh)),
          `Production of ${sayCount(parts.energies.length, 'month', 'months')} projected`,
          'estimated',
        )
      : null,
    missingCycles,
  };
}

function avoided(grid: GridFactor, production: Wh, label: string, basis: FigureBasis): PlainFigure {
  const kg = kwhOf(production).times(exact(grid.lbPerMwh)).times(exact(KG_PER_LB)).div(1000);
  return {
    value: kg.toDecimalPlaces(0, Exact.ROUND_HALF_UP).toString(),
    working: {
      words: `kWh × ${grid.lbPerMwh} pounds of CO₂ per MWh, in kilograms`,
      formula: `roundWhole(production * factor * ${KG_PER_LB} / 1000)`,
      inputs: [
        kwhInput('production', label, production, stated('Production')),
        plainInput(
          'factor',
          `${grid.region}, ${grid.basis}, ${grid.year}`,
          grid.lbPerMwh,
          'lb/MWh',
          rule('Emission factor of the grid, as stated in the assumptions', String(grid.year)),
        ),
      ],
      unit: 'kg',
      basis,
    },
  };
}
