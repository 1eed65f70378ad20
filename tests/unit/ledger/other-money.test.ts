import { describe, expect, it } from 'vitest';
import { loanMore } from '#shared/facts/finance.ts';
import { type HouseholdFacts, householdFacts } from '#shared/facts/household.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { day } from '#shared/units/day.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';

/** A household of six cycles with money of every other kind, each with its paper; the third cycle's production is not known. */
function withOtherMoney(): HouseholdFacts {
  const built = buildHousehold({ cycles: 6 });
  const paper = { kind: 'other', sha256: 'a'.repeat(64), size: 9, uploadedOn: '2025-07-01', uploadedBy: 'Priya' };
  const statements = built.statements.map((statement, index) =>
    index === 2
      ? { ...statement, productionWh: null, reads: statement.reads.filter(({ channel }) => channel !== 'production') }
      : statement,
  );
  return householdFacts.parse({
    ...built,
    statements,
    documents: [...built.documents, { ...paper, id: 'deal', fileName: 'agreement.pdf' }],
    loan: built.loan && { ...built.loan, documentId: 'deal' },
    otherLoans: [
      {
        id: 'share',
        kind: 'mortgageShare',
        loan: {
          lender: 'Harbour Mortgage',
          principalCents: 800_000,
          dealerFeeCents: 0,
          annualRate: '0.0425',
          termMonths: 300,
          fundedOn: '2025-05-20',
          firstPaymentOn: '2025-07-01',
          ...loanMore.parse({}),
          payments: [{ id: 'p', on: '2025-09-01', amountCents: 90_000, extraPrincipalCents: 40_000, note: null }],
        },
      },
    ],
    lease: {
      kind: 'powerPurchase',
      company: 'Roof Lettings',
      firstPaymentOn: '2025-06-14',
      termMonths: 240,
      monthlyCents: 0,
      ratePerKwh: '0.1195',
      yearlyRise: '0.029',
      documentId: 'deal',
    },
    costs: [
      ...built.costs,
      {
        id: 'care',
        on: '2025-07-31',
        kind: 'upkeep',
        label: 'Care',
        amountCents: 1_500,
        documentId: 'deal',
        every: 'month',
      },
      {
        id: 'srec',
        on: '2025-09-15',
        kind: 'srec',
        label: 'Certificates',
        amountCents: 4_100,
        documentId: null,
        every: 'quarter',
      },
      {
        id: 'lost',
        on: '2025-03-01',
        kind: 'depositLost',
        label: 'First installer',
        amountCents: 200_000,
        documentId: null,
      },
    ],
  });
}

describe('a ledger with other loans, a power purchase and recurring costs', () => {
  const facts = withOtherMoney();
  const ledger = computeLedger(facts, { today: BUILT_TODAY });

  it('works every figure out from its own working', () => {
    const worked = everyWorking(ledger);
    expect(worked.length).toBeGreaterThan(100);
    expect(worked.filter((one) => !one.agrees)).toEqual([]);
  });

  it('is settled today by all loans’ payoffs together', () => {
    const alone = (loans: Pick<HouseholdFacts, 'loan' | 'otherLoans'>) =>
      computeLedger({ ...facts, ...loans }, { today: BUILT_TODAY }).position.settledParts.loanPayoff.amountCents;
    expect(ledger.position.settledParts.loanPayoff.amountCents).toBe(
      alone({ loan: facts.loan, otherLoans: [] }) + alone({ loan: null, otherLoans: facts.otherLoans }),
    );
  });

  it('has a power payment in each cycle whose production is known, and none where it is not', () => {
    const bought = ledger.entries.filter(({ id }) => id.startsWith('lease-'));
    const unknown = ledger.cycles[2]?.to;
    expect(bought.map(({ cycle }) => cycle)).toEqual(ledger.cycles.map(({ to }) => to).filter((to) => to !== unknown));
  });

  it('adds to the same total by entry, by cycle and by book', () => {
    const counted = ledger.entries.filter(({ basis }) => basis !== 'memo');
    const byEntry = counted.reduce((sum, { amountCents }) => sum + amountCents, 0);
    const { all } = ledger.position.sums;
    const books = Object.entries(all).filter(([book]) => book !== 'cashSoFar');
    expect(books.reduce((sum, [, figure]) => sum + figure.amountCents, 0)).toBe(byEntry);
    expect(ledger.position.points.reduce((sum, point) => sum + point.addedCents, 0)).toBe(byEntry);
    expect(ledger.position.cashSoFar.amountCents).toBe(byEntry);
  });

  it('goes on paying what goes on in the projection, and ends what ends', () => {
    const months = ledger.position.projection?.months ?? [];
    const care = (until: string | null) => {
      const costs = facts.costs.map((cost) => (cost.id === 'care' && until ? { ...cost, until: day(until) } : cost));
      return computeLedger({ ...facts, costs }, { today: BUILT_TODAY }).position.projection?.months ?? [];
    };
    const ended = care('2027-12-31');
    const sum = (some: typeof months) => some.reduce((total, { books }) => total + books.upkeep, 0);
    const after = months.filter(({ on }) => on > '2028-01-01').length;
    expect(sum(ended) - sum(months)).toBe(1_500 * after);
    expect(sum(months.slice(-12))).toBe(-18_000);
  });
});
