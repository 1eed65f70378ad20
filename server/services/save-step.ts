import type * as z from 'zod/mini';
import type {
  beforeBody,
  cashBody,
  creditBody,
  houseBody,
  incentiveBody,
  loanBody,
  mortgageBody,
  planBody,
  roofBody,
  SetupStep,
} from '#shared/api/setup.ts';
import type { CostKind } from '#shared/facts/house.ts';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { isTimeZone } from '../clock.ts';
import type { Tx } from '../db/client.ts';
import { readAssumptions, readSteps } from '../db/facts/read-house.ts';
import { readCosts } from '../db/facts/read-money.ts';
import {
  replacePlans,
  replaceRoof,
  replaceUsageBefore,
  updateHouse,
  writeAssumptions,
  writeStep,
} from '../db/facts/write-house.ts';
import { replaceCosts, writeCredit, writeIncentive, writeLoan, writeMortgage } from '../db/facts/write-money.ts';
import type { Actor, Deps } from '../deps.ts';
import { fieldFault } from './field-fault.ts';
import { unknownPaper } from './money/known-paper.ts';
import { writeHousehold } from './write-household.ts';

type StepDeps = Pick<Deps, 'db' | 'clock'>;
type Saved = Result<null>;

/** What the cash step holds: money paid at the start, outside loan and mortgage. */
export const CASH_KINDS: readonly CostKind[] = ['signing', 'permit'];

function saveStep(deps: StepDeps, actor: Actor, step: SetupStep, write: (tx: Tx) => void): Saved {
  return writeHousehold(deps, actor, { action: 'setup-saved', about: step }, (tx) => {
    write(tx);
    writeStep(tx, actor.householdId, step, 'done');
    return succeed(null);
  });
}

/** The first value that stands twice, with its place; null when each stands once. */
function repeated(values: readonly string[]): number | null {
  const seen = new Set<string>();
  for (const [index, value] of values.entries()) {
    if (seen.has(value)) return index;
    seen.add(value);
  }
  return null;
}

function refuseRepeated(list: string, field: string, values: readonly string[], message: string): Fault[] {
  const index = repeated(values);
  return index === null ? [] : [fieldFault(`${list}.${index}.${field}`, message)];
}

export function saveHouse(deps: StepDeps, actor: Actor, body: z.infer<typeof houseBody>): Saved {
  if (!isTimeZone(body.timeZone)) {
    return fail('invalid-fields', null, [fieldFault('timeZone', 'Choose a time zone such as America/New_York.')]);
  }
  return saveStep(deps, actor, 'house', (tx) => updateHouse(tx, actor.householdId, body));
}

export function saveRoof(deps: StepDeps, actor: Actor, body: z.infer<typeof roofBody>): Saved {
  const faults = [
    ...refuseRepeated(
      'arrays',
      'id',
      body.arrays.map(({ id }) => id),
      'Two arrays have the same id.',
    ),
    ...refuseRepeated(
      'meters',
      'id',
      body.meters.map(({ id }) => id),
      'Two meters have the same number.',
    ),
  ];
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  return saveStep(deps, actor, 'roof', (tx) => replaceRoof(tx, actor.householdId, body));
}

/** The plans, each held against the rules of the plan's language; `plan-invalid` with every fault found. */
export function savePlans(deps: StepDeps, actor: Actor, body: z.infer<typeof planBody>): Saved {
  const twice = refuseRepeated(
    'plans',
    'from',
    body.plans.map(({ from }) => from),
    'Two plans begin on the same day.',
  );
  if (twice.length > 0) return fail('invalid-fields', null, twice);
  const faults: Fault[] = [];
  const plans = body.plans.map(({ from, plan, withoutRoof }, index) => {
    const parsed = parsePlan(plan);
    if (!parsed.ok) faults.push(...placed(parsed.problem.faults, `plans.${index}.plan`, parsed.problem.detail));
    const without = withoutRoof === null ? null : parsePlan(withoutRoof);
    if (without !== null && !without.ok) {
      faults.push(...placed(without.problem.faults, `plans.${index}.withoutRoof`, without.problem.detail));
    }
    return { from, plan: parsed.ok ? parsed.value : plan, withoutRoof: without?.ok ? without.value : withoutRoof };
  });
  if (faults.length > 0) return fail('plan-invalid', faults[0]?.message ?? null, faults);
  return saveStep(deps, actor, 'plan', (tx) => replacePlans(tx, actor.householdId, plans, body.opening));
}

function placed(faults: readonly Fault[], at: string, detail: string | null): Fault[] {
  if (faults.length === 0) return [fieldFault(at, detail ?? 'This rate plan cannot be used.')];
  return faults.map((fault) => ({ ...fault, field: fault.field === null ? at : `${at}.${fault.field}` }));
}

export function saveBefore(deps: StepDeps, actor: Actor, body: z.infer<typeof beforeBody>): Saved {
  const rows = [...body.usageBefore].sort((a, b) => (a.from < b.from ? -1 : a.from > b.from ? 1 : 0));
  const faults = body.usageBefore.flatMap((row, index) =>
    row.from < row.to ? [] : [fieldFault(`usageBefore.${index}.to`, 'The end must lie after the start.')],
  );
  for (const [index, row] of rows.entries()) {
    const next = rows[index + 1];
    if (next !== undefined && next.from < row.to) {
      faults.push(
        fieldFault(`usageBefore.${body.usageBefore.indexOf(next)}.from`, 'This period overlaps another one.'),
      );
    }
  }
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  return saveStep(deps, actor, 'before', (tx) => replaceUsageBefore(tx, actor.householdId, rows));
}

export function saveLoan(deps: StepDeps, actor: Actor, { loan }: z.infer<typeof loanBody>): Saved {
  if (loan !== null && loan.firstPaymentOn < loan.fundedOn) {
    return fail('invalid-fields', null, [
      fieldFault('loan.firstPaymentOn', 'The first payment cannot come before the funding.'),
    ]);
  }
  return saveStep(deps, actor, 'loan', (tx) => writeLoan(tx, actor.householdId, loan));
}

export function saveMortgage(deps: StepDeps, actor: Actor, { mortgage }: z.infer<typeof mortgageBody>): Saved {
  return saveStep(deps, actor, 'mortgage', (tx) => writeMortgage(tx, actor.householdId, mortgage));
}

export function saveCredit(deps: StepDeps, actor: Actor, { credit }: z.infer<typeof creditBody>): Saved {
  const costs = credit?.costs ?? [];
  const twice = refuseRepeated(
    'credit.costs',
    'id',
    costs.map(({ id }) => id),
    'Two costs have the same id.',
  );
  const unknown = costs.flatMap(({ documentId }, index) =>
    unknownPaper(deps, actor, documentId, `credit.costs.${index}.documentId`),
  );
  const faults = [...twice, ...unknown];
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  return saveStep(deps, actor, 'credit', (tx) => writeCredit(tx, actor.householdId, credit));
}

export function saveIncentive(deps: StepDeps, actor: Actor, { incentive }: z.infer<typeof incentiveBody>): Saved {
  if (incentive !== null && incentive.lastDay < incentive.firstDay) {
    return fail('invalid-fields', null, [
      fieldFault('incentive.lastDay', 'The last day cannot come before the first.'),
    ]);
  }
  return saveStep(deps, actor, 'incentive', (tx) => writeIncentive(tx, actor.householdId, incentive));
}

export function saveCash(deps: StepDeps, actor: Actor, body: z.infer<typeof cashBody>): Saved {
  const faults = body.costs.flatMap((cost, index) =>
    CASH_KINDS.includes(cost.kind)
      ? []
      : [
          fieldFault(
            `costs.${index}.kind`,
            'Here stand cash at signing and permits; other costs are entered under Money.',
          ),
        ],
  );
  faults.push(
    ...refuseRepeated(
      'costs',
      'id',
      body.costs.map(({ id }) => id),
      'Two costs have the same id.',
    ),
  );
  const known = readCosts(deps.db, actor.householdId);
  for (const [index, cost] of body.costs.entries()) {
    if (cost.amountCents < 0)
      faults.push(fieldFault(`costs.${index}.amountCents`, 'Write the amount without a minus.'));
    // A paper that was set under Money stays through this form; a new one is set there.
    const kept = known.find(({ id }) => id === cost.id)?.documentId ?? null;
    if (cost.documentId !== null && cost.documentId !== kept) {
      faults.push(fieldFault(`costs.${index}.documentId`, 'Papers are added under Money.'));
    }
  }
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  return saveStep(deps, actor, 'cash', (tx) => {
    replaceCosts(tx, actor.householdId, CASH_KINDS, body.costs);
    const stated = readAssumptions(tx, actor.householdId);
    writeAssumptions(tx, actor.householdId, { ...stated, upkeepYearlyCents: body.upkeepYearlyCents });
  });
}

/** Leaves a step for later; one that is done stays done. */
export function skipStep(deps: StepDeps, actor: Actor, step: SetupStep): Saved {
  if (readSteps(deps.db, actor.householdId).some((found) => found.step === step && found.state === 'done')) {
    return succeed(null);
  }
  return writeHousehold(deps, actor, { action: 'setup-skipped', about: step }, (tx) => {
    writeStep(tx, actor.householdId, step, 'skipped');
    return succeed(null);
  });
}
