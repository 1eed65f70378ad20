import type * as z from 'zod/mini';
import type { scenarioBody } from '#shared/api/try.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { readScenarios } from '../../db/facts/read-money.ts';
import { replaceScenarios } from '../../db/facts/write-money.ts';
import type { Actor, Deps } from '../../deps.ts';
import { fieldFault } from '../field-fault.ts';
import { ledgerOf } from '../ledger-of.ts';
import { writeHousehold } from '../write-household.ts';

/** Changes a household may keep; the facts' schema holds the same number. */
const MOST = 20;

/** Keeps a change by name, or changes one that is kept. Names are told apart without regard to case. */
export function keepScenario(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  id: string,
  body: z.infer<typeof scenarioBody>,
): Result<null> {
  if (!/^[\w-]{1,64}$/.test(id)) return fail('not-found', 'There is no such change.');
  const kept = readScenarios(deps.db, actor.householdId);
  const known = kept.find((one) => one.id === id);
  const name = body.name.trim();
  if (name === '') return fail('invalid-fields', null, [fieldFault('name', 'Give it a name.')]);
  if (kept.some((one) => one.id !== id && one.name.toLowerCase() === name.toLowerCase())) {
    return fail('invalid-fields', null, [fieldFault('name', 'Another change has this name. Choose a different one.')]);
  }
  if (known === undefined && kept.length >= MOST) {
    return fail('conflict', `${MOST} changes are kept already. Remove one first; what you have set stays here.`);
  }
  if (body.levers.plan !== null) {
    const parsed = parsePlan(body.levers.plan.plan);
    if (!parsed.ok) {
      return fail('invalid-fields', null, [
        fieldFault('levers.plan', parsed.problem.detail ?? 'This rate plan cannot be used.'),
      ]);
    }
  }
  const { today } = ledgerOf(deps, actor.householdId);
  const scenario = { id, name, levers: body.levers, createdOn: known?.createdOn ?? today };
  return writeHousehold(deps, actor, { action: 'change-kept', about: name }, (tx) => {
    const rows = known === undefined ? [...kept, scenario] : kept.map((one) => (one.id === id ? scenario : one));
    replaceScenarios(tx, actor.householdId, rows);
    return succeed(null);
  });
}

export function removeScenario(deps: Pick<Deps, 'db' | 'clock'>, actor: Actor, id: string): Result<null> {
  const kept = readScenarios(deps.db, actor.householdId);
  const known = kept.find((one) => one.id === id);
  if (known === undefined) return fail('not-found', 'This change is not kept any more.');
  return writeHousehold(deps, actor, { action: 'change-removed', about: known.name }, (tx) => {
    replaceScenarios(
      tx,
      actor.householdId,
      kept.filter((one) => one.id !== id),
    );
    return succeed(null);
  });
}
