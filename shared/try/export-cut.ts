import type { Levers } from '../facts/scenario.ts';
import type { ProjectionBasis } from '../position/basis.ts';
import type { Changes } from '../position/changes.ts';
import type { ProjectedMonth } from '../position/position.ts';
import { evenOn, type Projected, projectFrom } from '../position/project.ts';
import { keptAt } from '../settlement/place.ts';
import { type Cents, cents } from '../units/cents.ts';
import { ZERO_WH } from '../units/energy.ts';
import { Exact, exact } from '../units/rate.ts';
import type { DecimalText } from '../units/rate-text.ts';

/**
 * The projection where, from a day on, what is sent out is worth only a share of what it is worth today. The months are settled twice, as they are and with
 * nothing sent out from that day, and export keeps its share of the difference, month by month, rounded to the cent. So it holds under every plan, netting by
 * the kilowatt-hour and banks included, and a share of one changes nothing.
 */
export function keepOfExport(
  basis: ProjectionBasis,
  changes: Changes,
  { from, keep }: NonNullable<Levers['exportCut']>,
): Projected {
  if (exact(keep).eq(1)) return projectFrom(basis, changes);
  const none = projectFrom(basis, {
    ...changes,
    energy: (energy, period) => {
      const changed = changes.energy ? changes.energy(energy, period) : energy;
      return period.from < from ? changed : { ...changed, exportWh: ZERO_WH };
    },
  });
  if (!none.ok) return none;
  const whole = projectFrom(basis, changes);
  if (!whole.ok) return whole;
  const months = blend(whole.projection.months, none.projection.months, keep);
  return {
    ok: true,
    projection: {
      ...whole.projection,
      months,
      evenOn: evenOn(
        basis.evenSince,
        months.map((month) => month.on),
        months.map((month) => month.settledTodayCents),
      ),
    },
  };
}

function blend(whole: readonly ProjectedMonth[], none: readonly ProjectedMonth[], keep: DecimalText): ProjectedMonth[] {
  const share = exact(keep);
  const between = (all: Cents, without: Cents): Cents =>
    all === without
      ? all
      : cents(without + new Exact(all - without).times(share).toDecimalPlaces(0, Exact.ROUND_HALF_UP).toNumber());
  let lost = 0;
  return whole.map((month, at) => {
    const other = keptAt(none, at);
    const billAvoided = between(month.books.billAvoided, other.books.billAvoided);
    const utilityBankCents = between(month.utilityBankCents, other.utilityBankCents);
    const lessNow = month.books.billAvoided - billAvoided;
    lost += lessNow;
    return {
      ...month,
      books: { ...month.books, billAvoided },
      addedCents: cents(month.addedCents - lessNow),
      cashSoFarCents: cents(month.cashSoFarCents - lost),
      utilityBankCents,
      settledTodayCents: cents(month.settledTodayCents - lost - (month.utilityBankCents - utilityBankCents)),
    };
  });
}
