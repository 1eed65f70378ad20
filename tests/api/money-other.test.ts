import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { logApi } from '#shared/api/log.ts';
import { moneyApi } from '#shared/api/money.ts';
import { type LeaseBody, moneyOtherApi, type OtherLoanBody } from '#shared/api/money-other.ts';
import { positionApi } from '#shared/api/position.ts';
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

const view = async () => (await home.owner.call(moneyOtherApi.view, { params: home.params })).value;
const position = async () => (await home.owner.call(positionApi.view, { params: home.params })).value.position;

const COST = {
  on: day('2025-07-31'),
  kind: 'upkeep' as const,
  label: 'Care contract',
  amountCents: cents(1_500),
  documentId: null,
  every: 'month' as const,
  until: null,
};
const LOAN: OtherLoanBody = {
  kind: 'homeEquity',
  lender: 'Calder Savings',
  principalCents: cents(600_000),
  dealerFeeCents: cents(0),
  annualRate: '0.072',
  termMonths: 120,
  fundedOn: day('2025-05-20'),
  firstPaymentOn: day('2025-07-01'),
  documentId: null,
};
const LEASE: LeaseBody = {
  kind: 'lease',
  company: 'Roof Lettings',
  firstPaymentOn: day('2025-07-01'),
  termMonths: 240,
  monthlyCents: cents(9_000),
  ratePerKwh: null,
  yearlyRise: '0.02',
  documentId: null,
};

describe('a recurring cost', () => {
  it('counts each time it came, says when it comes next, and stops where it is ended', async () => {
    const before = (await position()).cashSoFar.amountCents;
    await home.owner.call(moneyApi.addCost, { params: home.params, body: COST });
    const { costs } = await view();
    const cost = costs.costs.find(({ label }) => label === 'Care contract');
    const standing = costs.standings.find(({ id }) => id === cost?.id);
    const times = standing?.times ?? 0;
    expect(times).toBeGreaterThan(1);
    expect(standing?.toDateCents).toBe(-1_500 * times);
    expect(standing?.nextOn).not.toBeNull();
    expect((await position()).cashSoFar.amountCents).toBe(before - 1_500 * times);
    const sumOfYears = costs.totals.reduce((sum, { amount }) => sum + amount.amountCents, 0);
    expect(sumOfYears).toBe(costs.paid.amountCents + costs.received.amountCents);
    expect(everyWorking(costs).filter((one) => !one.agrees)).toEqual([]);

    const params = { ...home.params, id: cost?.id ?? '' };
    const ended = await home.owner.call(moneyOtherApi.changeCost, {
      params,
      body: { ...COST, until: day('2025-08-31') },
    });
    const after = ended.value.costs.standings.find(({ id }) => id === cost?.id);
    expect(after).toMatchObject({ times: 2, toDateCents: -3_000, nextOn: null });
    const money = (await home.owner.call(moneyApi.view, { params: home.params })).value;
    expect(money.costsCents).toBe(-ended.value.costs.paid.amountCents);
    await home.owner.call(moneyApi.removeCost, { params });
    expect((await position()).cashSoFar.amountCents).toBe(before);
    expect((await home.owner.call(moneyOtherApi.changeCost, { params, body: COST })).status).toBe(404);
  });

  it.each([
    ['that ends before it begins', { until: day('2025-07-30') }, 'until'],
    ['that comes once and has a last day', { every: null, until: day('2026-07-30') }, 'until'],
    ['that began before roofs were financed', { on: day('1600-01-01') }, 'on'],
    ['of nothing', { amountCents: cents(0) }, 'amountCents'],
  ])('%s is refused by its field', async (_what, change, field) => {
    const refused = await home.owner.call(moneyApi.addCost, { params: home.params, body: { ...COST, ...change } });
    expect(refused.status).toBe(400);
    expect(refused.problem.faults.map((fault) => fault.field)).toEqual([field]);
  });

  it('of a day to come has not moved yet', async () => {
    const later = { ...COST, label: 'New inverter', every: null, on: day('2035-05-01') };
    await home.owner.call(moneyApi.addCost, { params: home.params, body: later });
    const { costs } = await view();
    const cost = costs.costs.find(({ label }) => label === 'New inverter');
    expect(costs.standings.find(({ id }) => id === cost?.id)).toEqual({
      id: cost?.id,
      times: 0,
      toDateCents: 0,
      nextOn: '2035-05-01',
      each: null,
    });
    await home.owner.call(moneyApi.removeCost, { params: { ...home.params, id: cost?.id ?? '' } });
  });
});

describe('another loan', () => {
  it('lowers settled today by its payoff and cash by its payments, and leaves the solar loan as it is', async () => {
    const before = await position();
    const solar = (await home.owner.call(moneyApi.view, { params: home.params })).value.loan;
    const { loans } = (await home.owner.call(moneyOtherApi.addLoan, { params: home.params, body: LOAN })).value;
    const [loan] = loans;
    expect(loan?.paidCents).toBeGreaterThan(0);
    const after = await position();
    expect(after.settledParts.loanPayoff.amountCents).toBe(
      before.settledParts.loanPayoff.amountCents - (loan?.payoff.amountCents ?? 0),
    );
    expect(after.cashSoFar.amountCents).toBe(before.cashSoFar.amountCents - (loan?.paidCents ?? 0));
    expect((await home.owner.call(moneyApi.view, { params: home.params })).value.loan).toEqual(solar);
    expect(everyWorking([loans, after]).filter((one) => !one.agrees)).toEqual([]);

    const params = { ...home.params, id: loan?.id ?? '' };
    const body = {
      on: day('2025-08-01'),
      amountCents: cents(100_000),
      extraPrincipalCents: cents(90_000),
      note: 'From savings',
      reamortize: false,
      documentId: null,
    };
    const paid = (await home.owner.call(moneyOtherApi.addPayment, { params, body })).value.loans[0];
    expect(paid?.payoff.amountCents).toBeLessThan(loan?.payoff.amountCents ?? 0);
    const kept = await home.owner.call(moneyOtherApi.changeLoan, { params, body: { ...LOAN, annualRate: '0.069' } });
    expect(kept.value.loans[0]?.facts).toMatchObject({ annualRate: '0.069', payments: [{ note: 'From savings' }] });
    const paymentId = kept.value.loans[0]?.facts.payments[0]?.id ?? '';
    const gone = await home.owner.call(moneyOtherApi.removePayment, { params: { ...params, paymentId } });
    expect(gone.value.loans[0]?.facts.payments).toEqual([]);
    const again = await home.owner.call(moneyOtherApi.removePayment, { params: { ...params, paymentId } });
    expect(again.status).toBe(404);
    await home.owner.call(moneyOtherApi.removeLoan, { params });
    expect((await position()).settledToday).toEqual(before.settledToday);
    expect((await home.owner.call(moneyOtherApi.removeLoan, { params })).status).toBe(404);
    expect((await home.owner.call(moneyOtherApi.changeLoan, { params, body: LOAN })).status).toBe(404);
  });

  it.each([
    ['paid before it was funded', { firstPaymentOn: day('2025-05-19') }, 'firstPaymentOn'],
    ['whose fee is more than its principal', { dealerFeeCents: cents(600_001) }, 'dealerFeeCents'],
    ['at a rate below zero', { annualRate: '-0.01' }, 'annualRate'],
    ['at a rate nobody lends at', { annualRate: '7.2' }, 'annualRate'],
    ['whose paper is not here', { documentId: 'x' }, 'documentId'],
  ])('%s is refused by its field', async (_what, change, field) => {
    const refused = await home.owner.call(moneyOtherApi.addLoan, { params: home.params, body: { ...LOAN, ...change } });
    expect(refused.problem.faults.map((fault) => fault.field)).toEqual([field]);
    expect((await view()).loans).toEqual([]);
  });

  it('takes no payment from before it, and none whose extra principal is more than the payment', async () => {
    const { loans } = (await home.owner.call(moneyOtherApi.addLoan, { params: home.params, body: LOAN })).value;
    const params = { ...home.params, id: loans[0]?.id ?? '' };
    const pay = (on: string, extra: number) =>
      home.owner.call(moneyOtherApi.addPayment, {
        params,
        body: {
          on: day(on),
          amountCents: cents(100),
          extraPrincipalCents: cents(extra),
          note: null,
          reamortize: false,
          documentId: null,
        },
      });
    expect((await pay('2025-05-19', 0)).problem.faults.map(({ field }) => field)).toEqual(['on']);
    expect((await pay('2025-08-01', 101)).problem.faults.map(({ field }) => field)).toEqual(['extraPrincipalCents']);
    await home.owner.call(moneyOtherApi.removeLoan, { params });
  });

  it('comes in tens at most', async () => {
    const add = () => home.owner.call(moneyOtherApi.addLoan, { params: home.params, body: LOAN });
    for (let count = 0; count < 10; count += 1) expect((await add()).status).toBe(200);
    expect((await add()).problem.code).toBe('quota-reached');
    for (const { id } of (await view()).loans) {
      await home.owner.call(moneyOtherApi.removeLoan, { params: { ...home.params, id } });
    }
  });
});

describe('a lease', () => {
  it('is paid as it runs, with nothing to pay off', async () => {
    const before = await position();
    const { lease } = (await home.owner.call(moneyOtherApi.putLease, { params: home.params, body: LEASE })).value;
    expect(lease?.paid.amountCents).toBeGreaterThan(0);
    expect(lease?.next?.on.slice(8)).toBe('01');
    expect(lease?.endsOn).toBe('2045-07-01');
    const after = await position();
    expect(after.settledToday.amountCents).toBe(before.settledToday.amountCents - (lease?.paid.amountCents ?? 0));
    expect(after.settledParts.loanPayoff).toEqual(before.settledParts.loanPayoff);
    expect(everyWorking([lease, after]).filter((one) => !one.agrees)).toEqual([]);
  });

  it('or a power purchase stands in its place, paid by what each cycle made', async () => {
    const body: LeaseBody = { ...LEASE, kind: 'powerPurchase', monthlyCents: cents(0), ratePerKwh: '0.12' };
    const { lease } = (await home.owner.call(moneyOtherApi.putLease, { params: home.params, body })).value;
    const made = facts.statements.map(({ productionWh }) => productionWh ?? 0);
    // The cycles end after the first of July, so that each is paid: kWh × $0.12 to the cent.
    expect(lease?.paid.amountCents).toBe(made.reduce<number>((sum, wh) => sum + Math.round((wh * 12) / 1000), 0));
    expect(lease).toMatchObject({ next: null, missing: [] });
    expect((await home.owner.call(moneyOtherApi.removeLease, { params: home.params })).value.lease).toBeNull();
    expect((await home.owner.call(moneyOtherApi.removeLease, { params: home.params })).status).toBe(404);
  });

  it.each<[string, Partial<LeaseBody>, string]>([
    ['without its payment', { monthlyCents: cents(0) }, 'monthlyCents'],
    ['with a price per kWh', { ratePerKwh: '0.12' }, 'ratePerKwh'],
    ['that more than rises', { yearlyRise: '0.9' }, 'yearlyRise'],
    ['of power without a price', { kind: 'powerPurchase', monthlyCents: cents(0) }, 'ratePerKwh'],
    [
      'of power at no price there is',
      { kind: 'powerPurchase', monthlyCents: cents(0), ratePerKwh: '11' },
      'ratePerKwh',
    ],
    ['of power by the month', { kind: 'powerPurchase', ratePerKwh: '0.12' }, 'monthlyCents'],
    ['whose paper is not here', { documentId: 'x' }, 'documentId'],
  ])('%s is refused by its field', async (_what, change, field) => {
    const body = { ...LEASE, ...change };
    const refused = await home.owner.call(moneyOtherApi.putLease, { params: home.params, body });
    expect(refused.problem.faults.map((fault) => fault.field)).toEqual([field]);
  });
});
