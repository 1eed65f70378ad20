import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { csvText } from '#server/services/csv-text.ts';
import { creditApi } from '#shared/api/credit.ts';
import { logApi } from '#shared/api/log.ts';
import { moneyApi } from '#shared/api/money.ts';
import { moneyLoanApi } from '#shared/api/money-loan.ts';
import { peopleApi } from '#shared/api/people.ts';
import { positionApi } from '#shared/api/position.ts';
import { setupApi } from '#shared/api/setup.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import { statementFile } from '#tests/support/paper-files.ts';
import { setUpFrom } from '#tests/support/set-up.ts';
import {
  failOnConsole,
  newHousehold,
  startTestServer,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

const PLAIN = { reamortize: false, documentId: null };
const ONCE = { documentId: null, every: null, until: null };

const facts = buildHousehold({ cycles: 3 });
let server: TestServer;
let home: TestHousehold;
beforeAll(async () => {
  server = await startTestServer();
  home = await newHousehold(server);
  setUpFrom(server, home, facts);
  await home.owner.call(logApi.addStatementFile, {
    params: home.params,
    file: { fileName: 'summer.csv', bytes: statementFile(facts.statements) },
  });
  await home.owner.call(logApi.post, { params: home.params, body: { replaceReadings: false } });
});
afterAll(() => server.close());

describe('money', () => {
  it('stands in the money view as in the position', async () => {
    const money = (await home.owner.call(moneyApi.view, { params: home.params })).value;
    const { position } = (await home.owner.call(positionApi.view, { params: home.params })).value;
    expect(money.loan?.payoffCents).toBe(-position.settledParts.loanPayoff.amountCents);
    expect(money.incentive?.owedCents).toBe(position.settledParts.incentiveOwed.amountCents);
    expect(money.loan?.paidCents).toBe(-(position.sums.all.loan?.amountCents ?? 0));
    expect(money.insurance?.avoidedCents).toBe(position.sums.all.insurance?.amountCents);
    expect(money.incentive?.earnedCents).toBe(
      money.incentive?.cycles.reduce((sum, { earned }) => sum + earned.amountCents, 0),
    );
    const owed = money.incentive?.cycles.reduce((sum, cycle) => sum + cycle.owedCents, 0) ?? 0;
    expect(owed - (money.incentive?.unmatchedCents ?? 0)).toBe(money.incentive?.owedCents);
    expect(money.costsCents).toBe(540_000);
    expect(money.loan?.payoff.amountCents).toBe(money.loan?.payoffCents);
    const worked = everyWorking(money);
    expect(worked.map((one) => one.path)).toContain('loan.payoff');
    expect(worked.filter((one) => !one.agrees)).toEqual([]);
  });

  it('a recorded payment stands in for the scheduled one, and goes again when it is removed', async () => {
    const before = (await home.owner.call(moneyApi.view, { params: home.params })).value;
    const body = {
      on: day('2025-09-02'),
      amountCents: cents(100_000),
      extraPrincipalCents: cents(70_000),
      note: null,
      ...PLAIN,
    };
    const paid = (await home.owner.call(moneyApi.addLoanPayment, { params: home.params, body })).value;
    const { loan } = (await home.owner.call(moneyLoanApi.view, { params: home.params })).value;
    expect(loan?.schedule.filter(({ recorded }) => recorded)).toMatchObject([
      { on: '2025-09-02', payment: { amountCents: 100_000 } },
    ]);
    expect(paid.loan?.payoffCents).toBeLessThan(before.loan?.payoffCents ?? 0);
    const id = paid.loan?.facts.payments[0]?.id ?? '';
    const after = (await home.owner.call(moneyApi.removeLoanPayment, { params: { ...home.params, id } })).value;
    expect(after).toEqual(before);
    const again = await home.owner.call(moneyApi.removeLoanPayment, { params: { ...home.params, id } });
    expect(again.status).toBe(404);
  });

  it('payments that cannot be are refused at their field', async () => {
    const body = {
      on: day('2025-09-02'),
      amountCents: cents(100),
      extraPrincipalCents: cents(200),
      note: null,
      ...PLAIN,
    };
    const more = await home.owner.call(moneyApi.addLoanPayment, { params: home.params, body });
    expect(more.problem.faults[0]?.field).toBe('extraPrincipalCents');
    const early = { ...body, on: day('2020-01-01'), extraPrincipalCents: cents(0) };
    const before = await home.owner.call(moneyApi.addLoanPayment, { params: home.params, body: early });
    expect(before.problem.faults[0]?.field).toBe('on');
  });

  it('a cost lowers cash so far by itself, an income raises it', async () => {
    const cash = async () =>
      (await home.owner.call(positionApi.view, { params: home.params })).value.position.cashSoFar.amountCents;
    const start = await cash();
    const cost = {
      on: day('2025-10-02'),
      kind: 'repair' as const,
      label: 'Isolator',
      amountCents: cents(21_000),
      ...ONCE,
    };
    await home.owner.call(moneyApi.addCost, { params: home.params, body: cost });
    expect(await cash()).toBe(start - 21_000);
    const income = { ...cost, kind: 'srec' as const, label: 'Certificates', amountCents: cents(5000) };
    await home.owner.call(moneyApi.addCost, { params: home.params, body: income });
    expect(await cash()).toBe(start - 16_000);
  });

  it('the loan taken away and entered again still has its recorded payments', async () => {
    const body = {
      on: day('2025-11-02'),
      amountCents: cents(30_000),
      extraPrincipalCents: cents(0),
      note: 'kept',
      ...PLAIN,
    };
    await home.owner.call(moneyApi.addLoanPayment, { params: home.params, body });
    const { payments: _, ...loan } = facts.loan ?? { payments: [] };
    await home.owner.call(setupApi.loan, { params: home.params, body: { loan: null } });
    expect((await home.owner.call(moneyApi.view, { params: home.params })).value.loan).toBeNull();
    await home.owner.call(setupApi.loan, { params: home.params, body: { loan: loan as never } });
    const { value } = await home.owner.call(moneyApi.view, { params: home.params });
    expect(value.loan?.facts.payments.map(({ note }) => note)).toContain('kept');
  });
});

describe('the tax credit', () => {
  const put = (taxYear: string, body: object) =>
    home.owner.call(creditApi.putYear, { params: { ...home.params, taxYear }, body: body as never });
  const filed = { limitCents: 520_000, status: 'filed', filedOn: '2026-03-08', refundOn: '2026-03-29', asRefund: true };
  const planned = { limitCents: 600_000, status: 'planned', filedOn: null, refundOn: null, asRefund: true };

  it('goes through the returns: used, carried, received', async () => {
    await put('2025', filed);
    const view = (await put('2026', planned)).value;
    // 30 % of $34,800 is $10,440: $5,200 used in 2025, $5,240 carried.
    expect(view).toMatchObject({
      earnedCents: 1_044_000,
      usedCents: 520_000,
      receivedCents: 520_000,
      stillToCarryCents: 524_000,
    });
    expect(view.lines.map(({ line15Cents }) => line15Cents)).toEqual([520_000, 524_000]);
    expect(view.checks.map(({ agrees }) => agrees)).toEqual([true, true]);
    expect(view.credit?.years.map(({ typedBy }) => typedBy)).toEqual(['Priya', 'Priya']);
    expect(view.forms.map(({ taxYear, schedule3 }) => [taxYear, schedule3])).toEqual([
      [2025, '5a'],
      [2026, null],
    ]);
  });

  it('refuses a year that is none, and dates out of order', async () => {
    expect((await put('20x5', planned)).status).toBe(404);
    expect((await put('1999', planned)).status).toBe(404);
    expect((await put('2025', { ...filed, filedOn: null, refundOn: null })).problem.faults[0]?.field).toBe('filedOn');
    expect((await put('2025', { ...filed, filedOn: '2025-12-01' })).problem.faults[0]?.field).toBe('filedOn');
    expect((await put('2025', { ...filed, refundOn: '2026-01-01' })).problem.faults[0]?.field).toBe('refundOn');
  });

  it('comes as a table for the preparer, with amounts to the cent and a caution', async () => {
    const { text, headers } = await home.owner.call(creditApi.summaryCsv, { params: home.params });
    expect(headers.get('content-disposition')).toContain('tax-credit-summary-2026-12-01.csv');
    expect(headers.get('content-type')).toBe('text/csv; charset=utf-8');
    const rows = text.split('\r\n');
    expect(rows).toContain('"Form 5695, Part I",Line,2025,2026');
    expect(rows).toContain('Used,15,5200.00,5240.00');
    expect(rows).toContain('Carried forward,16,5240.00,0.00');
    expect(text).toMatch(/not tax advice/);
  });

  it('a year can be taken out again', async () => {
    const view = (await home.owner.call(creditApi.removeYear, { params: { ...home.params, taxYear: '2026' } })).value;
    expect(view.credit?.years.map(({ taxYear }) => taxYear)).toEqual([2025]);
  });
});

describe('cells of a table that a spreadsheet would run (OWASP, CSV injection)', () => {
  it.each(['=1+1', '+1', '-1', '@SUM(A1)', '\t=1', '\r=1', '\n=1', '\0=1'])('%j is made a text', (cell) => {
    const [, written = ''] = /^\ufeff"?(.)/.exec(csvText([[cell]])) ?? [];
    expect(written).toBe("'");
  });
  it('leaves amounts and whole numbers alone', () => {
    expect(csvText([[{ cents: cents(-1250) }, -7, 'a "b", c', null]])).toBe('\ufeff-12.50,-7,"a ""b"", c",\r\n');
  });
});

describe('the set-up', () => {
  const save = (step: 'house' | 'roof' | 'before' | 'cash' | 'plan', body: object) =>
    home.owner.call(setupApi[step] as typeof setupApi.house, { params: home.params, body: body as never });

  it('a plan that breaks a rule of the language is refused in words', async () => {
    const plan = {
      ...facts.plans[0]?.plan,
      credits: [
        {
          id: 'exportCredit',
          label: 'Export',
          kind: 'export',
          basis: 'export',
          rates: [{ from: '2025-01-01', rate: '0.09' }],
          to: 'nowhere',
        },
      ],
    };
    const refused = await save('plan', {
      plans: [{ from: '2025-01-01', plan, withoutRoof: null }],
      opening: facts.opening,
    });
    expect(refused.status).toBe(422);
    expect(refused.problem.code).toBe('plan-invalid');
    expect(refused.problem.faults[0]?.field).toMatch(/^plans\.0\.plan/);
    expect(refused.problem.faults[0]?.message).toMatch(/\w+ \w+/);
  });

  it.each([
    [
      'house',
      { name: 'H', place: '', utility: '', timeZone: 'Mars/Base', latitude: null, longitude: null, switchOn: null },
      'timeZone',
    ],
    [
      'before',
      {
        usageBefore: [
          { from: '2025-01-01', to: '2025-02-01', importWh: 1 },
          { from: '2025-01-20', to: '2025-03-01', importWh: 1 },
        ],
      },
      'usageBefore.1.from',
    ],
    [
      'cash',
      {
        costs: [{ id: 'a', on: '2025-01-01', kind: 'repair', label: 'x', amountCents: 1, documentId: null }],
        upkeepYearlyCents: 0,
      },
      'costs.0.kind',
    ],
    [
      'cash',
      {
        costs: [{ id: 'a', on: '2025-01-01', kind: 'permit', label: 'x', amountCents: 1, documentId: 'd' }],
        upkeepYearlyCents: 0,
      },
      'costs.0.documentId',
    ],
  ] as const)('%s with a fault names the field', async (step, body, field) => {
    expect((await save(step, body)).problem.faults.map((fault) => fault.field)).toContain(field);
  });

  it('a skipped step is skipped, a done one stays done', async () => {
    const skip = (step: 'mortgage' | 'before') =>
      home.owner.call(setupApi.skip, { params: home.params, body: { step } });
    const states = (await skip('mortgage')).value.steps;
    expect(states.find(({ step }) => step === 'mortgage')?.state).toBe('done');
    const fresh = await newHousehold(server, 'Fresh');
    const view = await fresh.owner.call(setupApi.skip, { params: fresh.params, body: { step: 'loan' } });
    expect(view.value.steps.map(({ state }) => state)).toEqual([
      'open',
      'open',
      'open',
      'open',
      'skipped',
      'open',
      'open',
      'open',
      'open',
    ]);
    expect((await fresh.owner.call(positionApi.view, { params: fresh.params })).value.unfinishedSteps).toHaveLength(9);
  });

  it('people are listed with their roles', async () => {
    await home.person('Jonah', 'member');
    const people = (await home.owner.call(peopleApi.list, { params: home.params })).value;
    expect(people.map(({ name, role, you }) => [name, role, you])).toEqual([
      ['Priya', 'owner', true],
      ['Jonah', 'member', false],
    ]);
  });
});
