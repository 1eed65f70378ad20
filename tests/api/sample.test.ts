import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase, openDatabase } from '#server/db/client.ts';
import { readSteps } from '#server/db/facts/read-house.ts';
import { defaultMigrationsDir, migrateDatabase } from '#server/db/migrate.ts';
import type { Deps } from '#server/deps.ts';
import { silentLog } from '#server/log.ts';
import { laySample, type SampleSignIn } from '#server/sample/lay-sample.ts';
import { readSampleFile } from '#server/sample/sample-household.ts';
import { readPaper } from '#server/services/credit/papers.ts';
import { ledgerOf } from '#server/services/ledger-of.ts';
import { loadFacts } from '#server/services/load-facts.ts';
import { addProductionFile } from '#server/services/log/add-production.ts';
import { addStatementFile } from '#server/services/log/add-statement.ts';
import { postDraft } from '#server/services/log/post-draft.ts';
import { signIn } from '#server/services/sign-in.ts';
import { SETUP_STEPS } from '#shared/api/setup.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { SAMPLE_TODAY, sampleFacts } from '#tests/support/sample-facts.ts';

const folder = mkdtempSync(join(tmpdir(), 'sample-db-'));
const database = openDatabase(join(folder, 'sample.db'));
const deps: Deps = {
  ...database,
  clock: () => new Date(`${SAMPLE_TODAY}T18:00:00Z`),
  log: silentLog,
  // Closed, so that the sample is seen not to need an open door.
  settings: { origins: [], https: false, signUp: 'closed', trustedProxies: 0, distDir: null, checkResponses: true },
};
let signIns: SampleSignIn[] = [];
/** Work rather than waiting, so that a busy machine does not fail the test. */
let cpuMs = 0;

beforeAll(async () => {
  await migrateDatabase(database, {
    migrationsDir: defaultMigrationsDir(),
    backupDir: join(folder, 'backups'),
    now: deps.clock(),
  });
  const before = process.cpuUsage();
  signIns = await laySample(deps);
  const { user, system } = process.cpuUsage(before);
  cpuMs = (user + system) / 1000;
});
afterAll(() => {
  closeDatabase(database);
  rmSync(folder, { recursive: true, force: true });
});

async function signedIn(role: string) {
  const found = signIns.find((one) => one.role === role);
  const result = await signIn(deps, { email: found?.email ?? '', password: found?.password ?? '' });
  if (!result.ok) throw new Error(`${role} cannot sign in`);
  return result.value;
}

async function owner() {
  const { user, households } = await signedIn('owner');
  const household = households[0];
  if (!household) throw new Error('the owner has no household');
  return { userId: user.id, name: user.name, householdId: household.id, role: 'owner' as const };
}

describe('laying the sample household', () => {
  it('takes less than ten seconds of work', () => {
    expect(cpuMs).toBeLessThan(10_000);
  });

  it('gives an owner, a household member and a tax preparer a sign-in each, with addresses nobody owns', async () => {
    expect(signIns.map(({ role }) => role)).toEqual(['owner', 'household member', 'tax preparer']);
    for (const { email, password } of signIns) {
      expect(email).toMatch(/@example\.org$/);
      expect(password.length).toBeGreaterThanOrEqual(15);
    }
    const roles = [];
    for (const { role } of signIns) roles.push((await signedIn(role)).households.map((one) => one.role));
    expect(roles).toEqual([['owner'], ['member'], ['preparer']]);
  });

  it('marks the household as the sample, with every step of the set-up done', async () => {
    const { householdId } = await owner();
    expect(loadFacts(deps.db, householdId)?.row.sample).toBe(true);
    const steps = readSteps(deps.db, householdId);
    expect(steps.map(({ step }) => step)).toEqual([...SETUP_STEPS]);
    expect(steps.filter(({ state }) => state !== 'done')).toEqual([]);
  });

  it('has the papers of the credit for the preparer to open', async () => {
    const { householdId } = await owner();
    const papers = loadFacts(deps.db, householdId)?.facts.documents.filter(({ kind }) => kind === 'credit') ?? [];
    expect(papers.length).toBe(4);
    const { user } = await signedIn('tax preparer');
    const preparer = { userId: user.id, name: user.name, householdId, role: 'preparer' as const };
    for (const { id } of papers) {
      const opened = readPaper(deps, preparer, id);
      expect(opened.ok && opened.value.contentType).toBe('application/pdf');
    }
  });

  it('comes to the same figures as the files do without a server', async () => {
    const { ledger } = ledgerOf(deps, (await owner()).householdId);
    const direct = computeLedger(sampleFacts(), { today: SAMPLE_TODAY });
    expect(ledger.position.points).toEqual(direct.position.points);
    expect(ledger.entries.map(({ date, amountCents }) => [date, amountCents])).toEqual(
      direct.entries.map(({ date, amountCents }) => [date, amountCents]),
    );
  });

  it('accepts the exchange of October 2025 and leaves the short export of September 2026 open', async () => {
    const { ledger } = ledgerOf(deps, (await owner()).householdId);
    const other = ledger.cycles.filter(({ state }) => state !== 'balanced').map(({ to, state }) => [to, state]);
    expect(other).toEqual([
      ['2025-10-14', 'accepted'],
      ['2026-09-14', 'differs'],
    ]);
  });

  it('leaves a month to log, which goes in without a fault and balances', async () => {
    const actor = await owner();
    const files = [
      addStatementFile(deps, actor, readSampleFile('next/statement.csv')),
      addProductionFile(deps, actor, readSampleFile('next/production.csv'), 'production'),
      addProductionFile(deps, actor, readSampleFile('next/intervals-import.csv'), 'import'),
      addProductionFile(deps, actor, readSampleFile('next/intervals-export.csv'), 'export'),
      addProductionFile(deps, actor, readSampleFile('next/monitor.csv'), 'monitor'),
    ];
    expect(files.filter(({ ok }) => !ok)).toEqual([]);
    const posted = postDraft(deps, actor, { replaceReadings: false });
    if (!posted.ok) throw new Error(posted.problem.detail ?? posted.problem.code);
    expect(posted.value.cycles.map(({ to, state, differs }) => [to, state, differs])).toEqual([
      ['2026-11-13', 'balanced', []],
    ]);
    expect(posted.value.readingsDays).toEqual({ production: 30, import: 30, export: 30, monitor: 30 });
  });
});
