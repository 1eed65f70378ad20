import type { CompiledUsage } from '../settlement/compile-usage.ts';
import { keptAt } from '../settlement/place.ts';
import { orRefusal, refuse } from '../settlement/refused.ts';
import { EMPTY_OPENING } from '../settlement/settlement.ts';
import { cents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { EnergyCycle, ProjectionBasis } from './basis.ts';
import { settleAlone, settleSide } from './bill-side.ts';
import { drawing } from './chance.ts';
import { candidateAt, candidatesOf, completeCycles, drawnEnergy, type Urns, urnsOf } from './draws.ts';
import type { Range } from './outlook.ts';
import type { PeriodEnergy } from './periods.ts';
import { evenOn, moneyOfProduction, type ProjectionParts, projectParts } from './project.ts';

export type MadeRange = { ok: true; range: Range } | { ok: false; why: string };

/** Complete cycles a range needs. */
export const CYCLES_FOR_RANGE = 12;

const RESAMPLES = 200;

/** Where the plan cannot be compiled each future is settled in full, about twenty times as slow. */
const FULL_RESAMPLES = 40;

const SEED = 19_051_884;

/**
 * The 10–90 % range of the base projection: its months drawn again from the house's own, with their production, use and share sent out together, each
 * month for itself, and every bill settled again by the plan's rules with its banks carried on. The same basis and seed give the same range. What the draws leave
 * as it is: prices, degradation, the plan, and whatever would change for many months at once.
 */
export function rangeOf(basis: ProjectionBasis, options: { seed?: number; resamples?: number } = {}): MadeRange {
  const complete = completeCycles(basis).length;
  if (complete < CYCLES_FOR_RANGE) {
    return { ok: false, why: `A range needs twelve complete cycles; the record has ${complete}.` };
  }
  const parts = projectParts(basis);
  if (!parts.ok) return parts;
  const resamples = options.resamples ?? (parts.sides.roof.compiled === null ? FULL_RESAMPLES : RESAMPLES);
  const future = futures(basis, parts, drawing(options.seed ?? SEED));
  const made = orRefusal(() => Array.from({ length: resamples }, () => future()));
  if (!made.ok) return { ok: false, why: `A drawn month cannot be settled. ${made.problem.detail}` };
  const days = parts.months.map((month) => month.on);
  const evens = made.value.map((settled) => evenOn(basis.evenSince, days, settled));
  return { ok: true, range: rangeFrom(days.length, made.value, evens) };
}

function rangeFrom(monthCount: number, settled: readonly Float64Array[], evens: readonly (Day | null)[]): Range {
  const count = settled.length;
  const low = Math.ceil(count * 0.1) - 1;
  const high = Math.ceil(count * 0.9) - 1;
  const column = new Float64Array(count);
  const months = Array.from({ length: monthCount }, (_, month) => {
    for (const [at, line] of settled.entries()) column[at] = Number(line[month]);
    column.sort();
    return { lowCents: cents(Number(column[low])), highCents: cents(Number(column[high])) };
  });
  // A future that does not come even within the horizon comes after all that do.
  const inOrder = evens.filter((even) => even !== null).sort();
  return {
    resamples: count,
    months,
    evenEarliest: inOrder[low] ?? null,
    evenLatest: inOrder[high] ?? null,
    evenWithin: inOrder.length,
  };
}

/** Draws one future after another: what is settled at the end of each month, in cents. Refuses where a plan refuses a drawn month. */
function futures(basis: ProjectionBasis, parts: ProjectionParts, draw: (below: number) => number): () => Float64Array {
  const { sides, months, periods } = parts;
  const fixed = fixedOf(parts);
  const table = drawTable(parts, urnsOf(basis));
  const opening = { ...basis.opening, balanceCents: null };
  // A bill that carries nothing on is in the table already.
  const isAlone = sides.plain.isStateless && sides.plain.compiled !== null;
  const chosen: Drawn[] = [];
  return () => {
    for (const at of periods.keys()) chosen[at] = table(at, draw);
    const roof = settleSide(sides.roof, opening, (at) => keptAt(chosen, at).roof);
    if (!roof.ok) return refuse(roof.why);
    const plain = isAlone ? null : settleSide(sides.plain, EMPTY_OPENING, (at) => keptAt(chosen, at).plain);
    if (plain && !plain.ok) return refuse(plain.why);
    const settled = new Float64Array(months.length);
    let running = 0;
    for (const [at, drawn] of chosen.entries()) {
      const without = plain ? plain.value.dueCents[at] : drawn.plainCents;
      running += Number(without) - Number(roof.value.dueCents[at]) + drawn.madeCents;
      settled[at] = Number(fixed[at]) + running + Number(roof.value.bankCents[at]);
    }
    return settled;
  };
}

/** What of settled today does not hang on the month's energy, by month. */
function fixedOf({ months, bills, made }: ProjectionParts): number[] {
  let running = 0;
  return months.map((month, at) => {
    running += Number(bills[at]?.avoidedCents) + Number(made[at]?.incentiveCents) + Number(made[at]?.purchaseCents);
    return month.settledTodayCents - running - Number(bills[at]?.bankCents);
  });
}

/** A period as one of its candidates has it, worked out once: there are few, and every future draws among them. */
type Drawn = {
  roof: CompiledUsage;
  plain: CompiledUsage;
  madeCents: number;
  /** The bill without the roof, where it carries nothing on from month to month. */
  plainCents: number | null;
};

function drawTable(parts: ProjectionParts, urns: Urns): (at: number, draw: (below: number) => number) => Drawn {
  const { periods, energies, sides, facts } = parts;
  const rows = periods.map((period, at) => {
    const urn = candidatesOf(urns, period);
    const known: (Drawn | undefined)[] = [];
    return { period, at, urn, base: keptAt(energies, at), known };
  });
  const make = ({ at, period }: (typeof rows)[number], energy: PeriodEnergy, cycle: EnergyCycle | null): Drawn => {
    const money = moneyOfProduction(facts, null, period, energy.productionWh);
    const plain = sides.usageWithout(at, energy, cycle);
    return {
      roof: sides.usageWith(at, energy, cycle),
      plain,
      madeCents: money.incentiveCents + money.purchaseCents,
      plainCents: settleAlone(sides.plain, at, plain),
    };
  };
  return (at, draw) => {
    const row = keptAt(rows, at);
    const { urn, base, period, known } = row;
    const index = urn.days === 0 ? 0 : candidateAt(urn, draw(urn.days));
    const found = known[index];
    if (found !== undefined) return found;
    const candidate = urn.candidates[index];
    const made = candidate
      ? make(row, drawnEnergy(urns, period, candidate, base), candidate.cycle)
      : make(row, base, null);
    known[index] = made;
    return made;
  };
}
