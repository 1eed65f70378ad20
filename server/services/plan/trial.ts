import type { TrialRow, TrialView } from '#shared/api/plan.ts';
import type { Cycle } from '#shared/ledger/cycle.ts';
import { input, ownFigure } from '#shared/metering/source.ts';
import type { Figure } from '#shared/position/position.ts';
import { type Result, succeed } from '#shared/problem.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { settleCycle } from '#shared/settlement/settle.ts';
import { EMPTY_OPENING, type Opening, type Settlement } from '#shared/settlement/settlement.ts';
import { type Cents, dollarsText, subtractCents, sumCents } from '#shared/units/cents.ts';
import type { Deps } from '../../deps.ts';
import { ledgerOf } from '../ledger-of.ts';
import { type HouseCycle, houseCycles } from './house-usages.ts';
import { pricesTakenBack } from './prices-taken-back.ts';
import { ridersOf, saidOf, withRiders } from './riders.ts';

const YEAR = 12;

/**
 * The house's last twelve cycles, or all, settled on another plan, cycle after cycle with banks that begin empty, beside the present plan and the
 * bill. Riders that are read from the bill are at the price each bill printed. A cycle without what the plan asks for is left out and says why. Stores nothing.
 */
export function tryPlan(
  deps: Deps,
  householdId: string,
  body: { plan: unknown; cycles: 'year' | 'all' },
): Result<TrialView> {
  const parsed = parsePlan(body.plan);
  if (!parsed.ok) return parsed;
  const { facts, ledger } = ledgerOf(deps, householdId);
  const all = houseCycles(facts);
  const chosen = body.cycles === 'all' ? all : all.slice(-YEAR);
  const first = chosen[0];
  if (first === undefined) return succeed({ rows: [], totals: null, left: [], pricesTakenBack: false, riders: [] });
  const { plan, moved } = pricesTakenBack(parsed.value, first.from);
  const byEnd = new Map(ledger.cycles.map((cycle) => [cycle.to, cycle]));
  const riders = ridersOf(plan, facts.plans);
  const asPrinted: string[][] = [];
  const rows: TrialRow[] = [];
  let opening: Opening = EMPTY_OPENING;
  let last: Settlement | null = null;
  for (const cycle of chosen) {
    const known = byEnd.get(cycle.to);
    if (known === undefined) continue;
    const priced = withRiders(plan, riders, cycle.learned, cycle.from);
    const settled = settleOn(priced.plan, opening, cycle);
    if (typeof settled !== 'string') {
      opening = settled.closing;
      last = settled.settlement;
      asPrinted.push(priced.asPrinted);
    }
    rows.push(rowOf(known, settled));
  }
  return succeed({
    rows,
    totals: totalsOf(rows),
    left: leftIn(last),
    pricesTakenBack: moved,
    riders: saidOf(riders, asPrinted),
  });
}

function settleOn(
  plan: RatePlan,
  opening: Opening,
  cycle: HouseCycle,
): { settlement: Settlement; closing: Opening } | string {
  const usage = cycle.usage(plan);
  if (typeof usage === 'string') return usage;
  const settled = settleCycle(plan, opening, usage);
  if (settled.ok) return settled.value;
  return settled.problem.faults[0]?.message ?? settled.problem.detail ?? 'The plan cannot settle this cycle.';
}

function rowOf(known: Cycle, settled: { settlement: Settlement } | string): TrialRow {
  const settlement = typeof settled === 'string' ? null : settled.settlement;
  return {
    from: known.from,
    to: known.to,
    importWh: known.energy.import?.wh ?? null,
    exportWh: known.energy.export?.wh ?? null,
    billedCents: known.asItWas.amountCents,
    present: known.settlement && dueOf(known.settlement, 'the present plan'),
    trial: settlement && dueOf(settlement, 'the trial plan'),
    why: typeof settled === 'string' ? settled : null,
    paidApartCents: sumCents((settlement?.payouts ?? []).map(({ amountCents }) => amountCents)),
  };
}

/** The current charges a settlement comes to: its lines in due. */
function dueOf(settlement: Settlement, name: string): Figure {
  const lines = settlement.lines.filter((line) => line.inDue);
  return {
    amountCents: sumCents(lines.map(({ amountCents }) => amountCents)),
    working: {
      words: `Lines of the bill on ${name}, added up`,
      formula: lines.length === 0 ? '0' : lines.map((_, at) => `line${at + 1}`).join(' + '),
      inputs: lines.map((line, at) =>
        input(`line${at + 1}`, line.label, dollarsText(line.amountCents), 'USD', ownFigure(line.working.words)),
      ),
      unit: 'USD',
      basis: 'computed',
    },
  };
}

type Full = TrialRow & { present: Figure; trial: Figure };

/** Totals over the cycles that have all three figures, so that like is held against like. */
function totalsOf(rows: readonly TrialRow[]): TrialView['totals'] {
  const full = rows.filter((row): row is Full => row.present !== null && row.trial !== null);
  if (full.length === 0) return null;
  const billed = sumOf(
    'Billed',
    full.map((row) => row.billedCents),
  );
  const present = sumOf(
    'On the present plan',
    full.map((row) => row.present.amountCents),
  );
  const trial = sumOf(
    'On the trial plan',
    full.map((row) => row.trial.amountCents),
  );
  return {
    cycles: full.length,
    billed,
    present,
    trial,
    difference: {
      amountCents: subtractCents(trial.amountCents, present.amountCents),
      working: {
        words: 'On the trial plan, less on the present plan',
        formula: 'trial - present',
        inputs: [
          input('trial', 'On the trial plan', dollarsText(trial.amountCents), 'USD', ownFigure('the trial')),
          input('present', 'On the present plan', dollarsText(present.amountCents), 'USD', ownFigure('the ledger')),
        ],
        unit: 'USD',
        basis: 'computed',
      },
    },
    paidApartCents: sumCents(full.map((row) => row.paidApartCents)),
  };
}

function sumOf(label: string, amounts: readonly Cents[]): Figure {
  return {
    amountCents: sumCents(amounts),
    working: {
      words: `${label}, added up over ${amounts.length} ${amounts.length === 1 ? 'cycle' : 'cycles'}`,
      formula: 'sum(cycles)',
      inputs: [input('cycles', label, amounts.map(dollarsText), 'USD', ownFigure('each cycle'))],
      unit: 'USD',
      basis: 'computed',
    },
  };
}

function leftIn(last: Settlement | null): TrialView['left'] {
  return (last?.banks ?? []).map(({ label, unit, move, period }) => ({
    label: period === null ? label : `${label}, ${period}`,
    unit,
    amount: move.close,
  }));
}
