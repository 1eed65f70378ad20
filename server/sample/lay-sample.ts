import type { Result } from '#shared/problem.ts';
import type { Actor, Deps } from '../deps.ts';
import { acceptDifference } from '../services/accept-difference.ts';
import { createHousehold } from '../services/create-household.ts';
import { addPaper } from '../services/credit/papers.ts';
import { putYear } from '../services/credit/put-year.ts';
import { ledgerOf } from '../services/ledger-of.ts';
import { addProductionFile } from '../services/log/add-production.ts';
import { addStatementFile } from '../services/log/add-statement.ts';
import { postDraft } from '../services/log/post-draft.ts';
import { addCost } from '../services/money/costs.ts';
import { addPerson } from '../services/people.ts';
import { addLoanPayment, addReceipt } from '../services/record-money.ts';
import {
  saveBefore,
  saveCash,
  saveCredit,
  saveHouse,
  saveIncentive,
  saveLoan,
  saveMortgage,
  savePlans,
  saveRoof,
} from '../services/save-step.ts';
import { signUp } from '../services/sign-up.ts';
import { readablePassword } from './readable-password.ts';
import { readSampleFile, readSampleHousehold, type SampleHousehold } from './sample-household.ts';

/** A sign-in of the sample, to be shown once. `role` in words. */
export type SampleSignIn = { role: string; name: string; email: string; password: string };

type LayDeps = Pick<Deps, 'db' | 'clock' | 'log' | 'settings'>;

/**
 * Lays the sample household through the services a person would use: sign-up, the steps of the set-up, papers through the importers, money rows,
 * tax years, and one difference accepted with a note; the short export of September 2026 is left open, and `fixtures/sample/next` is left to log.
 * Passwords are random. The sample's own facts are good, so any refusal is a bug and throws.
 */
export async function laySample(deps: LayDeps): Promise<SampleSignIn[]> {
  const sample = readSampleHousehold();
  const { people } = sample;
  const owner = { role: 'owner', ...people.owner, password: readablePassword() };
  const member = { role: 'household member', ...people.member, password: readablePassword() };
  const preparer = { role: 'tax preparer', ...people.preparer, password: readablePassword() };

  // The sample comes before anybody could sign up, so a closed door does not hold it back.
  const signedUp = await signUp({ ...deps, settings: { ...deps.settings, signUp: 'open' } }, owner);
  const user = must('sign-up', signedUp).user;
  const { name, timeZone } = sample.house;
  const household = must('household', createHousehold(deps, user, { name, timeZone }, { sample: true }));
  const actor: Actor = { userId: user.id, name: user.name, householdId: household.id, role: 'owner' };
  must('member', await addPerson(deps, actor, { ...member, role: 'member' }));
  must('preparer', await addPerson(deps, actor, { ...preparer, role: 'preparer' }));

  setUp(deps, actor, sample);
  logPapers(deps, actor, sample);
  recordMoney(deps, actor, sample);
  acceptPlanted(deps, actor, sample);
  deps.log('info', 'sample-laid', { household: household.id });
  return [owner, member, preparer];
}

function must<T>(what: string, result: Result<T>): T {
  if (result.ok) return result.value;
  const { code, detail, faults } = result.problem;
  throw new Error(`the sample household could not be laid (${what}): ${code} ${detail ?? faults[0]?.message ?? ''}`);
}

function setUp(deps: LayDeps, actor: Actor, sample: SampleHousehold): void {
  must('house', saveHouse(deps, actor, sample.house));
  must('roof', saveRoof(deps, actor, sample.roof));
  must('plan', savePlans(deps, actor, sample.plan));
  must('before', saveBefore(deps, actor, sample.before));
  must('loan', saveLoan(deps, actor, sample.loan));
  must('mortgage', saveMortgage(deps, actor, sample.mortgage));
  must('credit', saveCredit(deps, actor, sample.credit));
  must('incentive', saveIncentive(deps, actor, sample.incentive));
  must('cash', saveCash(deps, actor, sample.cash));
}

/** The papers of the credit, then the back-log in one draft, as a bulk upload would be. */
function logPapers(deps: LayDeps, actor: Actor, sample: SampleHousehold): void {
  for (const path of sample.papers.credit) must(path, addPaper(deps, actor, readSampleFile(path)));
  for (const path of sample.papers.statements) must(path, addStatementFile(deps, actor, readSampleFile(path)));
  for (const { path, channel } of sample.papers.readings) {
    must(path, addProductionFile(deps, actor, readSampleFile(path), channel));
  }
  must('posting', postDraft(deps, actor, { replaceReadings: false }));
}

function recordMoney(deps: LayDeps, actor: Actor, sample: SampleHousehold): void {
  const { loanPayments, receipts, costs } = sample.money;
  for (const row of loanPayments) must(`loan payment of ${row.on}`, addLoanPayment(deps, actor, row));
  for (const row of receipts) must(`cheque of ${row.on}`, addReceipt(deps, actor, row));
  for (const row of costs) must(`cost of ${row.on}`, addCost(deps, actor, row));
  for (const { taxYear, ...body } of sample.creditYears)
    must(`tax year ${taxYear}`, putYear(deps, actor, String(taxYear), body));
}

function acceptPlanted(deps: LayDeps, actor: Actor, sample: SampleHousehold): void {
  const { cycleTo: to, note } = sample.accepted;
  const cycle = ledgerOf(deps, actor.householdId).ledger.cycles.find((found) => found.to === to);
  const differing = cycle?.checks.filter(({ verdict }) => verdict === 'differs') ?? [];
  if (differing.length === 0) throw new Error(`the sample's cycle to ${to} does not differ`);
  for (const { key } of differing) must(key, acceptDifference(deps, actor, { to, check: key, note }));
}
