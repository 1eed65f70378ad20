import type * as z from 'zod/mini';
import type {
  appraisalBody,
  mortgageBalanceBody,
  mortgageEndBody,
  mortgagePremiumsBody,
  mortgageRecordBody,
} from '#shared/api/money-mortgage.ts';
import { type MortgageFacts, type MortgageMore, mortgageMore, mortgageTerms } from '#shared/facts/finance.ts';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';
import { dollarsText } from '#shared/units/cents.ts';
import { addMonths, type Day } from '#shared/units/day.ts';
import { readMortgage } from '../../db/facts/read-money.ts';
import { writeMortgage, writeMortgageMore } from '../../db/facts/write-money.ts';
import type { Actor, Deps } from '../../deps.ts';
import { newId } from '../../ids.ts';
import { fieldFault } from '../field-fault.ts';
import { ledgerOf } from '../ledger-of.ts';
import { writeHousehold } from '../write-household.ts';
import { unknownPaper } from './known-paper.ts';

type MortgageDeps = Pick<Deps, 'db' | 'clock'>;
type Event = { action: string; about: string };

/** Changes what is known beside the mortgage's terms; refused where there is none, or `faults` finds something. */
function changeMore(
  deps: MortgageDeps,
  actor: Actor,
  event: Event,
  faults: (mortgage: MortgageFacts) => Fault[],
  change: (more: MortgageMore) => MortgageMore,
): Result<null> {
  const mortgage = readMortgage(deps.db, actor.householdId);
  if (mortgage === null) return fail('conflict', 'Enter the mortgage first, in the set-up.');
  const found = faults(mortgage);
  if (found.length > 0) return fail('invalid-fields', found[0]?.message ?? null, found);
  return writeHousehold(deps, actor, event, (tx) => {
    writeMortgageMore(tx, actor.householdId, change(mortgageMore.parse(mortgage)));
    return succeed(null);
  });
}

/** A day that is to come says nothing yet. */
function futureFault(deps: MortgageDeps, actor: Actor, field: string, on: Day | null): Fault[] {
  const { today } = ledgerOf(deps, actor.householdId);
  return on !== null && on > today ? [fieldFault(field, 'This day is still to come.')] : [];
}

/** Records what the home was said to be worth. */
export function addAppraisal(deps: MortgageDeps, actor: Actor, body: z.infer<typeof appraisalBody>): Result<null> {
  const about = `${body.on} ${dollarsText(body.valueCents)}`;
  return changeMore(
    deps,
    actor,
    { action: 'appraisal-added', about },
    () => [...futureFault(deps, actor, 'on', body.on), ...unknownPaper(deps, actor, body.documentId)],
    (more) => ({ ...more, appraisals: [...more.appraisals, { id: newId(), ...body }] }),
  );
}

/** Records what a statement of the lender says is owed. */
export function addMortgageBalance(
  deps: MortgageDeps,
  actor: Actor,
  body: z.infer<typeof mortgageBalanceBody>,
): Result<null> {
  const about = `${body.on} ${dollarsText(body.balanceCents)}`;
  return changeMore(
    deps,
    actor,
    { action: 'mortgage-balance-added', about },
    (mortgage) => [
      ...futureFault(deps, actor, 'on', body.on),
      ...(body.on < addMonths(mortgage.firstPaymentOn, -1)
        ? [fieldFault('on', 'The mortgage had not begun on this day.')]
        : []),
      ...unknownPaper(deps, actor, body.documentId),
    ],
    (more) => ({ ...more, balances: [...more.balances, { id: newId(), ...body }] }),
  );
}

function remove(
  deps: MortgageDeps,
  actor: Actor,
  action: string,
  id: string,
  of: (more: MortgageMore) => readonly { id: string }[],
  without: (more: MortgageMore) => MortgageMore,
): Result<null> {
  const mortgage = readMortgage(deps.db, actor.householdId);
  if (mortgage === null || !of(mortgage).some((one) => one.id === id)) {
    return fail('not-found', 'This entry is not there any more.');
  }
  return changeMore(deps, actor, { action, about: id }, () => [], without);
}

export function removeAppraisal(deps: MortgageDeps, actor: Actor, id: string): Result<null> {
  return remove(
    deps,
    actor,
    'appraisal-removed',
    id,
    (more) => more.appraisals,
    (more) => ({ ...more, appraisals: more.appraisals.filter((one) => one.id !== id) }),
  );
}

export function removeMortgageBalance(deps: MortgageDeps, actor: Actor, id: string): Result<null> {
  return remove(
    deps,
    actor,
    'mortgage-balance-removed',
    id,
    (more) => more.balances,
    (more) => ({ ...more, balances: more.balances.filter((one) => one.id !== id) }),
  );
}

/** Says how the home is used, whether payments were late and another lien is there, and when the removal was asked for. */
export function putMortgageRecord(
  deps: MortgageDeps,
  actor: Actor,
  body: z.infer<typeof mortgageRecordBody>,
): Result<null> {
  return changeMore(
    deps,
    actor,
    { action: 'mortgage-record-saved', about: body.requestedOn ?? '' },
    () => futureFault(deps, actor, 'requestedOn', body.requestedOn),
    (more) => ({ ...more, ...body }),
  );
}

/** Says what the premium is from a day on; one for each day. */
export function putMortgagePremiums(
  deps: MortgageDeps,
  actor: Actor,
  { premiums }: z.infer<typeof mortgagePremiumsBody>,
): Result<null> {
  const ordered = [...premiums].sort((a, b) => (a.from < b.from ? -1 : 1));
  return changeMore(
    deps,
    actor,
    { action: 'mortgage-premiums-saved', about: `${premiums.length}` },
    () =>
      premiums.flatMap(({ from }, index) =>
        premiums.findIndex((one) => one.from === from) < index
          ? [fieldFault(`premiums.${index}.from`, 'Another premium begins on this day.')]
          : [],
      ),
    (more) => ({ ...more, premiums: ordered }),
  );
}

/** Chooses which day the insurance could have gone anyway counts. */
export function putMortgageEnd(deps: MortgageDeps, actor: Actor, body: z.infer<typeof mortgageEndBody>): Result<null> {
  const mortgage = readMortgage(deps.db, actor.householdId);
  if (mortgage === null || mortgage.insurance === null) {
    return fail('conflict', 'Enter the mortgage and its insurance first, in the set-up.');
  }
  if (body.endRule === 'appreciation' && body.appreciationOn === null) {
    return fail('invalid-fields', null, [
      fieldFault('appreciationOn', 'Write the day on which the home’s value alone would have been enough.'),
    ]);
  }
  const terms = mortgageTerms.parse(mortgage);
  const insurance = { ...mortgage.insurance, ...body };
  return writeHousehold(deps, actor, { action: 'insurance-end-saved', about: body.endRule }, (tx) => {
    writeMortgage(tx, actor.householdId, { ...terms, insurance });
    return succeed(null);
  });
}
