import * as z from 'zod/mini';
import { setupStep } from '#shared/api/setup.ts';
import { loanMore, loanTerms, mortgageMore, mortgageTerms } from '#shared/facts/finance.ts';
import { type HouseholdExport, householdExport } from '#shared/facts/household.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import type { Tx } from '../db/client.ts';
import {
  insertHousehold,
  replacePlans,
  replaceUsageBefore,
  writeAssumptions,
  writeStep,
} from '../db/facts/write-house.ts';
import {
  insertCost,
  insertLoanPayment,
  insertReceipt,
  putCreditYear,
  replaceOtherLoans,
  replaceScenarios,
  writeCredit,
  writeCreditCarriedIn,
  writeIncentive,
  writeLease,
  writeLoan,
  writeLoanMore,
  writeMortgage,
  writeMortgageMore,
} from '../db/facts/write-money.ts';
import { insertDocument, insertStatement, putAccepted, putIntervalDay, sha256Of } from '../db/facts/write-papers.ts';
import { rejectedRows } from '../db/schema/papers.ts';
import { memberships } from '../db/schema/people.ts';
import type { Deps } from '../deps.ts';
import { newId } from '../ids.ts';
import { writeHousehold } from './write-household.ts';

type Bytes = ReadonlyMap<string, Buffer>;

function writeMoney(tx: Tx, id: string, facts: HouseholdExport['facts']): void {
  const { loan, mortgage, credit, incentive, costs } = facts;
  if (loan !== null) {
    const { payments } = loan;
    writeLoan(tx, id, loanTerms.parse(loan));
    writeLoanMore(tx, id, loanMore.parse(loan));
    for (const payment of payments) insertLoanPayment(tx, id, payment);
  }
  if (mortgage !== null) {
    writeMortgage(tx, id, mortgageTerms.parse(mortgage));
    writeMortgageMore(tx, id, mortgageMore.parse(mortgage));
  }
  replaceOtherLoans(tx, id, facts.otherLoans);
  writeLease(tx, id, facts.lease);
  replaceScenarios(tx, id, facts.scenarios);
  if (credit !== null) {
    const { years, carriedIn, ...terms } = credit;
    writeCredit(tx, id, terms);
    writeCreditCarriedIn(tx, id, carriedIn);
    for (const year of years) putCreditYear(tx, id, year);
  }
  if (incentive !== null) {
    const { received, ...terms } = incentive;
    writeIncentive(tx, id, terms);
    for (const receipt of received) insertReceipt(tx, id, receipt);
  }
  for (const cost of costs) insertCost(tx, id, cost);
}

function writePapers(tx: Tx, id: string, facts: HouseholdExport['facts'], bytes: Bytes): void {
  for (const document of facts.documents) {
    const content = bytes.get(document.id);
    if (content === undefined) throw new Error(`no bytes for ${document.id}`);
    insertDocument(tx, id, { ...document, state: 'kept', bytes: content });
  }
  for (const statement of facts.statements) insertStatement(tx, id, statement);
  for (const interval of facts.intervals) putIntervalDay(tx, id, interval);
  for (const accepted of facts.accepted) putAccepted(tx, id, accepted);
}

function writeRecord(tx: Tx, id: string, { record }: HouseholdExport): void {
  for (const { step, state } of record?.steps ?? []) {
    const known = setupStep.safeParse(step);
    if (known.success && state !== 'open') writeStep(tx, id, known.data, state);
  }
  const next = new Map<string, number>();
  for (const { documentId, row, column, found, reason } of record?.rejectedRows ?? []) {
    const ordinal = next.get(documentId) ?? 0;
    next.set(documentId, ordinal + 1);
    tx.insert(rejectedRows).values({ householdId: id, documentId, ordinal, row, column, found, reason }).run();
  }
}

/** Every file's bytes, each held against its hash and size. */
function readBytes({ facts, documentBytes }: HouseholdExport): Result<Bytes> {
  const bytes = new Map<string, Buffer>();
  for (const { id, fileName, sha256, size } of facts.documents) {
    const text = documentBytes[id];
    if (text === undefined) return fail('file-unreadable', `The export does not hold the file ${fileName}.`);
    const content = Buffer.from(text, 'base64');
    if (content.length !== size || sha256Of(content) !== sha256) {
      return fail('file-unreadable', `The file ${fileName} in the export is not the one that was uploaded.`);
    }
    bytes.set(id, content);
  }
  return succeed(bytes);
}

/** Makes a household out of an export, with this user as its owner: the same facts, the same files. All or nothing. */
export function restoreHousehold(
  deps: Pick<Deps, 'db' | 'clock'>,
  user: { id: string; name: string },
  exported: unknown,
  options: { sample: boolean } = { sample: false },
): Result<{ id: string }> {
  const parsed = householdExport.safeParse(exported);
  if (!parsed.success) {
    const [issue] = parsed.error.issues;
    const where = issue === undefined ? '' : ` (${z.core.toDotPath(issue.path)})`;
    return fail('file-unreadable', `This is not a household export of this version${where}.`);
  }
  const bytes = readBytes(parsed.data);
  if (!bytes.ok) return bytes;
  const { facts } = parsed.data;
  const id = newId();
  const createdAt = deps.clock().toISOString();
  const owner = { userId: user.id, name: user.name, householdId: id, role: 'owner' as const };
  return writeHousehold(deps, owner, { action: 'household-restored', about: facts.house.name }, (tx) => {
    insertHousehold(tx, { id, createdAt, sample: options.sample, house: facts.house, opening: facts.opening });
    writeAssumptions(tx, id, facts.assumptions);
    tx.insert(memberships).values({ householdId: id, userId: user.id, role: 'owner', since: createdAt }).run();
    replacePlans(tx, id, facts.plans, facts.opening);
    replaceUsageBefore(tx, id, facts.usageBefore);
    writePapers(tx, id, facts, bytes.value);
    writeMoney(tx, id, facts);
    writeRecord(tx, id, parsed.data);
    return succeed({ id });
  });
}
