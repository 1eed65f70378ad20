import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { restoreHousehold } from '#server/services/restore-household.ts';
import type { Endpoint } from '#shared/api/endpoint.ts';
import { moneyApi } from '#shared/api/money.ts';
import { moneyLoanApi } from '#shared/api/money-loan.ts';
import { peopleApi } from '#shared/api/people.ts';
import { setupApi } from '#shared/api/setup.ts';
import { loanMore } from '#shared/facts/finance.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import {
  failOnConsole,
  must,
  newHousehold,
  startTestServer,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

/** The 25-year loan of the checks: a dealer fee of 8,400 inside 38,400 at 4.99 %. Today is 2026-12-01: 18 payments are made. */
const TERMS = {
  lender: '=Saltmarsh Credit Union',
  principalCents: cents(3_840_000),
  dealerFeeCents: cents(840_000),
  annualRate: '0.0499',
  termMonths: 300,
  fundedOn: day('2025-05-20'),
  firstPaymentOn: day('2025-06-20'),
};
const { balances: _b, refinances: _r, documentId: _d, ...CONTRACT } = loanMore.parse({});
const ASSUMED = {
  ...CONTRACT,
  assumedPrepayment: { amountCents: cents(1_152_000), byPayment: 18 },
  payoffFeeCents: cents(5_000),
  security: 'fixtureFiling' as const,
};
const BALANCE = { on: day('2026-11-20'), balanceCents: cents(3_719_871), documentId: null };
const REFINANCE = {
  on: day('2026-11-25'),
  lender: 'Northpoint Savings',
  principalCents: cents(3_700_000),
  annualRate: '0.0399',
  termMonths: 180,
  firstPaymentOn: day('2026-12-25'),
  costsCents: cents(45_000),
  documentId: null,
};

let server: TestServer;
let home: TestHousehold;
let params: { householdId: string };
beforeAll(async () => {
  server = await startTestServer();
  home = await newHousehold(server);
  params = home.params;
});
afterAll(() => server.close());

const view = async () => {
  const { loan } = (await home.owner.call(moneyLoanApi.view, { params })).value;
  if (loan === null) throw new Error('there is no loan');
  return loan;
};
/** The fields a body is refused for; the body may be one that no type allows. */
const refusedFields = async <B, R>(endpoint: Endpoint<B, R>, body: object) =>
  (await home.owner.call(endpoint, { params, body: body as B })).problem.faults.map(({ field }) => field);

describe('the loan', () => {
  it('is nothing until one is entered, and nothing can be recorded of it', async () => {
    expect((await home.owner.call(moneyLoanApi.view, { params })).value).toEqual({ loan: null });
    expect((await home.owner.call(moneyLoanApi.putContract, { params, body: CONTRACT })).problem.code).toBe('conflict');
    expect((await home.owner.call(moneyLoanApi.payoff, { params: { ...params, on: '2026-12-01' } })).status).toBe(404);
    expect((await home.owner.call(moneyLoanApi.scheduleCsv, { params })).status).toBe(404);
    await home.owner.call(setupApi.loan, { params, body: { loan: TERMS } });
  });

  it('shows its payment, both rates, and a schedule whose every working evaluates', async () => {
    const loan = await view();
    expect(loan.next).toMatchObject({ on: '2026-12-20', payment: { amountCents: 22_426 } });
    expect(loan.schedule).toHaveLength(300);
    expect(loan.schedule.filter(({ past }) => past).at(-1)).toMatchObject({ number: 18, balanceCents: 3_719_554 });
    expect(Number(loan.aprWithFee?.apr).toFixed(6)).toBe('0.076310');
    expect(Number(loan.apr?.apr).toFixed(5)).toBe('0.04990');
    expect(loan.outcomes).toEqual([]);
    const money = (await home.owner.call(moneyApi.view, { params })).value;
    expect(money.loan).toMatchObject({ paymentCents: 22_426, payoffCents: loan.payoff.amountCents });
    const worked = everyWorking(loan);
    expect(worked.map(({ path }) => path)).toContain('aprWithFee.proof');
    expect(worked.filter(({ agrees }) => !agrees)).toEqual([]);
  });

  it('takes the rest of its contract: the payment then assumes a prepayment, and the three outcomes are told', async () => {
    await home.owner.call(moneyLoanApi.putContract, { params, body: ASSUMED });
    const loan = await view();
    expect(loan.facts).toMatchObject(ASSUMED);
    expect(loan.schedule[0]?.payment.amountCents).toBe(16_182);
    expect(loan.next?.payment.amountCents).toBe(23_128);
    expect(loan.prepaymentOn).toBe('2026-11-20');
    expect(loan.outcomes.map(({ prepaid, next }) => [prepaid, next?.amountCents])).toEqual([
      ['whole', 16_182],
      ['part', 19_655],
      ['nothing', 23_128],
    ]);
    expect(loan.levels.map(({ reason, fromNumber }) => [reason, fromNumber])).toEqual([
      ['start', 1],
      ['prepayment', 19],
    ]);
    expect(everyWorking(loan).filter(({ agrees }) => !agrees)).toEqual([]);
  });

  it('refuses a contract by its fields', async () => {
    const promotion = { months: 300, annualRate: '1.2', payment: 'none' };
    expect(
      await refusedFields(moneyLoanApi.putContract, { ...CONTRACT, promotion: { ...promotion, months: 24 } }),
    ).toEqual(['promotion.annualRate']);
    expect(await refusedFields(moneyLoanApi.putContract, { ...CONTRACT, promotion })).toEqual(['promotion.months']);
    const assumedPrepayment = { amountCents: 3_840_000, byPayment: 18 };
    expect(await refusedFields(moneyLoanApi.putContract, { ...CONTRACT, assumedPrepayment })).toEqual([
      'assumedPrepayment.amountCents',
    ]);
  });

  it('records a payment with which the lender re-amortized', async () => {
    const body = {
      on: day('2026-11-20'),
      amountCents: cents(1_168_182),
      extraPrincipalCents: cents(1_152_000),
      note: 'The tax credit',
      reamortize: true,
      documentId: null,
    };
    const money = (await home.owner.call(moneyApi.addLoanPayment, { params, body })).value;
    const loan = await view();
    expect(loan.next?.payment.amountCents).toBe(16_182);
    expect(loan.schedule[17]).toMatchObject({ recorded: true, payment: { amountCents: 1_168_182 } });
    expect(everyWorking(loan).filter(({ agrees }) => !agrees)).toEqual([]);
    const id = money.loan?.facts.payments[0]?.id ?? '';
    await home.owner.call(moneyApi.removeLoanPayment, { params: { ...params, id } });
    await home.owner.call(moneyLoanApi.putContract, { params, body: CONTRACT });
  });

  it('takes the lender’s balance in place of its own, shows the drift, and gives it back', async () => {
    const before = await view();
    const { loan } = (await home.owner.call(moneyLoanApi.addBalance, { params, body: BALANCE })).value;
    expect(loan?.balances).toMatchObject([
      { on: '2026-11-20', balanceCents: 3_719_871, ours: { amountCents: 3_719_554 } },
    ]);
    expect(loan?.schedule[17]).toMatchObject({ driftCents: 317, balanceCents: 3_719_871 });
    expect(loan?.paid.amountCents).toBe(before.paid.amountCents);
    expect(everyWorking(loan).filter(({ agrees }) => !agrees)).toEqual([]);
    expect(await refusedFields(moneyLoanApi.addBalance, BALANCE)).toEqual(['on']);
    const id = loan?.balances[0]?.id ?? '';
    expect((await home.owner.call(moneyLoanApi.removeBalance, { params: { ...params, id } })).value.loan).toEqual(
      before,
    );
    expect((await home.owner.call(moneyLoanApi.removeBalance, { params: { ...params, id } })).status).toBe(404);
  });

  it('refuses a balance by its fields', async () => {
    const fields = (change: object) => refusedFields(moneyLoanApi.addBalance, { ...BALANCE, ...change });
    expect(await fields({ on: '2025-05-19' })).toEqual(['on']);
    expect(await fields({ on: '2026-12-02' })).toEqual(['on']);
    expect(await fields({ balanceCents: -1 })).toEqual(['balanceCents']);
    expect(await fields({ documentId: 'nowhere' })).toEqual(['documentId']);
  });

  it('takes a refinance, with what it left to pay, and gives it back', async () => {
    const before = await view();
    const { loan } = (await home.owner.call(moneyLoanApi.addRefinance, { params, body: REFINANCE })).value;
    const [refinance] = loan?.refinances ?? [];
    expect(refinance?.cash.amountCents).toBe(3_700_000 - (refinance?.payoff.amountCents ?? 0) - 45_000);
    expect((loan?.paid.amountCents ?? 0) - before.paid.amountCents).toBe(refinance?.cash.amountCents);
    expect(loan?.schedule[18]).toMatchObject({ refinanced: true, on: '2026-11-25', balanceCents: 0 });
    expect(loan?.next).toMatchObject({ on: '2026-12-25' });
    expect(everyWorking(loan).filter(({ agrees }) => !agrees)).toEqual([]);
    expect(await refusedFields(moneyLoanApi.addRefinance, REFINANCE)).toEqual(['on']);
    const id = refinance?.id ?? '';
    expect((await home.owner.call(moneyLoanApi.removeRefinance, { params: { ...params, id } })).value.loan).toEqual(
      before,
    );
    expect((await home.owner.call(moneyLoanApi.removeRefinance, { params: { ...params, id } })).status).toBe(404);
  });

  it('refuses a refinance by its fields', async () => {
    const fields = (change: object) => refusedFields(moneyLoanApi.addRefinance, { ...REFINANCE, ...change });
    expect(await fields({ on: '2025-05-20' })).toEqual(['on']);
    expect(await fields({ firstPaymentOn: '2026-11-25' })).toEqual(['firstPaymentOn']);
    expect(await fields({ annualRate: '-0.01' })).toEqual(['annualRate']);
    expect(await fields({ documentId: 'nowhere' })).toEqual(['documentId']);
  });

  it('tells the payoff of any day', async () => {
    const on = (text: string) => home.owner.call(moneyLoanApi.payoff, { params: { ...params, on: text } });
    const { value } = await on('2026-11-30');
    // 37,195.54 × 4.99 % × 10 / 360 = 51.557
    expect(value).toMatchObject({ balanceCents: 3_719_554, interestCents: 5_156, days: 10, feeCents: 0 });
    expect(value.payoff.amountCents).toBe(3_719_554 + 5_156);
    expect(everyWorking(value)).toMatchObject([{ agrees: true }]);
    expect((await on('2050-05-20')).value.payoff.amountCents).toBe(0);
    const refused = (text: string) => home.owner.call(moneyLoanApi.payoff, { params: { ...params, on: text } });
    expect((await refused('2026-02-30')).problem.faults[0]?.field).toBe('on');
    expect((await refused('2025-05-19')).problem.faults[0]?.field).toBe('on');
  });

  it('comes as a table of which a spreadsheet runs nothing', async () => {
    const { text, headers } = await home.owner.call(moneyLoanApi.scheduleCsv, { params });
    expect(headers.get('content-disposition')).toContain('loan-schedule-2026-12-01.csv');
    const rows = text.split('\r\n');
    expect(rows).toHaveLength(302);
    expect(rows[1]).toBe(
      "'=Saltmarsh Credit Union,1,2025-06-20,224.26,159.68,64.58,0.00,0.00,0.00,38335.42,0.00,taken as paid to schedule",
    );
  });

  it('is an owner’s to change and a member’s to see; a preparer and strangers learn nothing of it', async () => {
    const before = await view();
    const member = await home.person('Jonah', 'member');
    const preparer = await home.person('Marisol', 'preparer');
    const stranger = (await newHousehold(server, 'Stranger', '4 Gull Court')).owner;
    expect((await member.call(moneyLoanApi.view, { params })).value.loan).toEqual(before);
    expect((await member.call(moneyLoanApi.addBalance, { params, body: BALANCE })).status).toBe(403);
    expect((await preparer.call(moneyLoanApi.view, { params })).status).toBe(403);
    expect((await stranger.call(moneyLoanApi.view, { params })).status).toBe(404);
    expect((await stranger.call(moneyLoanApi.addRefinance, { params, body: REFINANCE })).status).toBe(404);
    expect(await view()).toEqual(before);
  });

  it('travels whole in the export and back', async () => {
    await home.owner.call(moneyLoanApi.putContract, { params, body: ASSUMED });
    await home.owner.call(moneyLoanApi.addBalance, { params, body: BALANCE });
    await home.owner.call(moneyLoanApi.addRefinance, { params, body: REFINANCE });
    const { facts } = await view();
    const { text } = await home.owner.call(peopleApi.exportHousehold, { params });
    const exported: unknown = JSON.parse(text);
    const { id } = must(restoreHousehold(server.deps, { id: home.owner.userId, name: 'Priya' }, exported));
    const restored = (await home.owner.call(moneyLoanApi.view, { params: { householdId: id } })).value;
    expect(restored.loan).toEqual(await view());
    expect(facts).toMatchObject({ ...ASSUMED, balances: [BALANCE], refinances: [REFINANCE] });
  });
});
