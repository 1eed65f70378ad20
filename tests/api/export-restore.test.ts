import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sha256Of } from '#server/db/facts/write-papers.ts';
import { addPaper } from '#server/services/credit/papers.ts';
import { ledgerOf } from '#server/services/ledger-of.ts';
import { loadFacts } from '#server/services/load-facts.ts';
import { restoreHousehold } from '#server/services/restore-household.ts';
import { creditApi } from '#shared/api/credit.ts';
import { cyclesApi } from '#shared/api/cycles.ts';
import { logApi } from '#shared/api/log.ts';
import { moneyApi } from '#shared/api/money.ts';
import { moneyOtherApi } from '#shared/api/money-other.ts';
import { moneyPapersApi } from '#shared/api/money-papers.ts';
import { peopleApi } from '#shared/api/people.ts';
import { type HouseholdExport, householdExport, householdFacts } from '#shared/facts/household.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { intervalFile, statementFile } from '#tests/support/paper-files.ts';
import { setUpFrom } from '#tests/support/set-up.ts';
import {
  failOnConsole,
  must,
  newHousehold,
  startTestServer,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

let server: TestServer;
let home: TestHousehold;
let exported: HouseholdExport;

/** A household with something in every table. */
beforeAll(async () => {
  server = await startTestServer();
  home = await newHousehold(server);
  const facts = buildHousehold({
    cycles: 4,
    intervals: { channels: ['production', 'monitor'], minutes: 60 },
    change: (cycle, index) => (index === 2 ? { ...cycle, creditedKwh: cycle.exportKwh - 44 } : cycle),
  });
  setUpFrom(server, home, {
    ...facts,
    usageBefore: [{ from: facts.statements[0]?.from, to: facts.statements[0]?.to, importWh: 900_000 } as never],
    plans: facts.plans.map((plan) => ({ ...plan, withoutRoof: plan.plan })),
    opening: { ...facts.opening, banks: { creditBank: '1.25' }, balanceCents: 0 as never },
  });
  const { owner, params } = home;
  const bad = statementFile(facts.statements).replace(
    '2025-06-14,2025-07-14,line,non-bypassable,',
    '2025-06-14,2025-07-14,line,unheard of,',
  );
  const read = await owner.call(logApi.addStatementFile, { params, file: { fileName: 'all.csv', bytes: bad } });
  const documentId = read.value.files[0]?.documentId ?? '';
  await owner.call(logApi.keepGoodRows, { params: { ...params, documentId }, body: { keep: true } });
  for (const channel of ['production', 'monitor']) {
    const days = facts.intervals.filter((interval) => interval.channel === channel);
    const cut = days.map((found, index) =>
      index === 3 ? { ...found, values: found.values.map((v, step) => (step === 5 ? null : v)) } : found,
    );
    await owner.call(logApi.addProductionFile, {
      params,
      file: { fileName: `${channel}.csv`, bytes: `${intervalFile(cut)}${channel === 'monitor' ? '\n' : ''}` },
      fields: { channel },
    });
  }
  const draft = (await owner.call(logApi.draft, { params })).value;
  for (const { documentId: id } of draft.readings) {
    await owner.call(logApi.keepGoodRows, { params: { ...params, documentId: id }, body: { keep: true } });
  }
  (await owner.call(logApi.post, { params, body: { replaceReadings: false } })).value;
  const [first] = facts.statements;
  if (first === undefined) throw new Error('no statement');
  const { cycle } = (await owner.call(cyclesApi.one, { params: { ...params, to: first.to } })).value;
  const { id: _i, revision: _r, source: _s, reason: _e, enteredBy: _b, enteredAt: _a, ...body } = cycle.statement;
  (
    await owner.call(cyclesApi.correct, {
      params: { ...params, to: first.to },
      body: { statement: { ...body, printedDays: 31 }, reason: 'misread' },
    })
  ).value;
  const differing = ledgerOf(server.deps, home.id)
    .ledger.cycles.flatMap((found) => found.checks.map((check) => ({ to: found.to, check })))
    .find(({ check }) => check.verdict === 'differs');
  if (differing === undefined) throw new Error('nothing differs');
  const accept = { check: differing.check.key, note: 'Written to the office.' };
  (await owner.call(cyclesApi.accept, { params: { ...params, to: differing.to }, body: accept })).value;
  const pay = { on: '2025-09-01', amountCents: 50_000, extraPrincipalCents: 20_000, note: 'extra' };
  (await owner.call(moneyApi.addLoanPayment, { params, body: pay as never })).value;
  const { documentId: paper } = (
    await owner.call(moneyPapersApi.add, { params, file: { fileName: 'remittance.pdf', bytes: '%PDF-1.7 remittance' } })
  ).value;
  (
    await owner.call(moneyApi.addReceipt, {
      params,
      body: {
        on: '2025-10-02',
        amountCents: 9100,
        note: null,
        from: '2025-06-14',
        to: '2025-09-14',
        quantityWh: 4_180_000,
        documentId: paper,
      } as never,
    })
  ).value;
  const care = {
    on: '2025-07-31',
    kind: 'upkeep',
    label: 'Care',
    amountCents: 1500,
    every: 'month',
    until: '2026-06-30',
  };
  (await owner.call(moneyApi.addCost, { params, body: { ...care, documentId: paper } as never })).value;
  const share = {
    kind: 'mortgageShare',
    lender: 'Harbour Mortgage',
    principalCents: 500_000,
    dealerFeeCents: 0,
    annualRate: '0.0425',
    termMonths: 120,
    fundedOn: '2025-05-20',
    firstPaymentOn: '2025-07-01',
    documentId: paper,
  };
  const { loans } = (await owner.call(moneyOtherApi.addLoan, { params, body: share as never })).value;
  (
    await owner.call(moneyOtherApi.addPayment, {
      params: { ...params, id: loans[0]?.id ?? '' },
      body: { ...pay, reamortize: false, documentId: paper } as never,
    })
  ).value;
  const power = {
    kind: 'powerPurchase',
    company: 'Roof Lettings',
    firstPaymentOn: '2025-07-01',
    termMonths: 240,
    monthlyCents: 0,
    ratePerKwh: '0.1195',
    yearlyRise: '0.02',
    documentId: paper,
  };
  (await owner.call(moneyOtherApi.putLease, { params, body: power as never })).value;
  (
    await owner.call(moneyApi.addCost, {
      params,
      body: { on: '2025-11-02', kind: 'repair', label: 'Isolator', amountCents: 21_000 } as never,
    })
  ).value;
  const year = { limitCents: 400_000, status: 'filed', filedOn: '2026-03-01', refundOn: null, asRefund: false };
  (await owner.call(creditApi.putYear, { params: { ...params, taxYear: '2025' }, body: year as never })).value;
  must(addPaper(server.deps, home.actor, { fileName: 'contract.pdf', bytes: Buffer.from('%PDF-1.7 contract') }));
  exported = householdExport.parse(JSON.parse((await owner.call(peopleApi.exportHousehold, { params })).text));
});
afterAll(() => server.close());

describe('the full export', () => {
  it('holds something of everything, and what the schema allows', () => {
    const { facts } = exported;
    expect(facts.statements.map(({ revision }) => revision)).toContain(2);
    for (const list of [
      facts.plans,
      facts.costs,
      facts.usageBefore,
      facts.documents,
      facts.intervals,
      facts.accepted,
    ]) {
      expect(list.length).toBeGreaterThan(0);
    }
    expect(facts.loan?.payments).toHaveLength(1);
    expect(facts.incentive?.received).toHaveLength(1);
    expect(facts.incentive?.received[0]?.documentId).toBe(facts.lease?.documentId);
    expect(facts.otherLoans[0]?.loan.payments).toHaveLength(1);
    expect(facts.costs.map(({ every }) => every)).toContain('month');
    expect(facts.credit?.years).toHaveLength(1);
    expect(facts.intervals.some(({ values }) => values.includes(null))).toBe(true);
    expect(Object.keys(exported.documentBytes)).toHaveLength(facts.documents.length);
    expect(exported.record?.rejectedRows.length).toBeGreaterThan(0);
  });

  it('holds the facts as the database gives them, which are facts by their schema', () => {
    const loaded = loadFacts(server.deps.db, home.id);
    expect(loaded?.facts).toEqual(exported.facts);
    expect(householdFacts.parse(loaded?.facts)).toEqual(loaded?.facts);
  });

  it('restores to an identical household: facts, files, record and every figure', () => {
    const user = { id: home.owner.userId, name: 'Priya' };
    const { id } = must(restoreHousehold(server.deps, user, JSON.parse(JSON.stringify(exported))));
    expect(id).not.toBe(home.id);
    expect(loadFacts(server.deps.db, id)?.facts).toEqual(exported.facts);
    expect(ledgerOf(server.deps, id).ledger).toEqual(ledgerOf(server.deps, home.id).ledger);
    expect(computeLedger(exported.facts, { today: exported.today })).toEqual(ledgerOf(server.deps, home.id).ledger);
    const plain = (value: unknown) => (Buffer.isBuffer(value) ? sha256Of(value) : value);
    // Documents are numbered as they came, the log's included; only their order is a fact.
    const apart = (column: string) => column !== 'household_id' && column !== 'ordinal';
    const cells = (row: unknown) =>
      Object.entries(row as object)
        .filter(([column]) => apart(column))
        .map(([column, value]) => [column, plain(value)]);
    const rows = (table: string, household: string) =>
      server.deps.sqlite
        .prepare(`SELECT * FROM ${table} WHERE household_id = ?`)
        .all(household)
        .map((row) => JSON.stringify(cells(row)))
        .sort();
    const tables = server.deps.sqlite
      .prepare(
        "SELECT m.name FROM sqlite_schema m WHERE type = 'table' AND EXISTS (SELECT 1 FROM pragma_table_info(m.name) WHERE name = 'household_id')",
      )
      .pluck()
      .all()
      .map(String)
      // Who may see a household, and who did what, belong to the installation and not to the export.
      .filter((table) => !['memberships', 'audit_events'].includes(table));
    expect(tables.length).toBeGreaterThan(20);
    for (const table of tables) expect([table, rows(table, id)]).toEqual([table, rows(table, home.id)]);
  });

  it.each([
    ['another format', (value: HouseholdExport) => ({ ...value, format: 'something-else' })],
    ['a later version', (value: HouseholdExport) => ({ ...value, version: 2 })],
    ['a missing file', (value: HouseholdExport) => ({ ...value, documentBytes: {} })],
    [
      'a file that was changed',
      (value: HouseholdExport) => ({
        ...value,
        documentBytes: Object.fromEntries(Object.keys(value.documentBytes).map((id) => [id, 'AAAA'])),
      }),
    ],
    ['nothing', () => null],
  ])('with %s is refused and leaves no household', (_what, change) => {
    const count = () => server.deps.sqlite.prepare('SELECT count(*) FROM households').pluck().get();
    const before = count();
    const result = restoreHousehold(server.deps, { id: home.owner.userId, name: 'Priya' }, change(exported));
    expect(result.ok ? null : result.problem.code).toBe('file-unreadable');
    expect(count()).toBe(before);
  });
});
