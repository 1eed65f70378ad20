import type { LeaseFacts } from '../facts/finance.ts';
import { sayKwh, sayMoney } from '../ledger/say.ts';
import { type Cents, negateCents, ZERO_CENTS } from '../units/cents.ts';
import { addDays, addMonths, type Day, monthsBetween } from '../units/day.ts';
import type { Wh } from '../units/energy.ts';
import { exact, kwhOf, roundToCents, usdOf } from '../units/rate.ts';
import type { Source, Working } from '../working.ts';
import type { UnplacedEntry } from './book.ts';
import { kwhInput, plainInput, stated, usdInput } from './inputs.ts';
import { type PaperName, sourceOfPaper } from './paper-source.ts';

/** A cycle as a power-purchase agreement sees it. */
export type LeaseCycle = {
  from: Day;
  to: Day;
  productionWh: Wh | null;
  estimated?: boolean;
  source?: Source | null;
};

/**
 * The payments of a lease or power-purchase agreement through a day: cash in the loan book, with nothing to pay off.
 *
 * A lease: the monthly payment on its own days, raised once each twelve payments. A power-purchase agreement: what each cycle made × the price of the year
 * its last day lies in, counted on that day; a cycle without production is not counted (`leaseMissing` names it). Both rounded to the cent
 * once. Common practice, no source: the contract's own wording decides.
 */
export function leaseEntries(
  lease: LeaseFacts,
  cycles: readonly LeaseCycle[],
  through: Day,
  papers: readonly PaperName[] = [],
): UnplacedEntry[] {
  const source = sourceOfPaper(lease.documentId, papers, stated('Lease terms as entered'));
  if (lease.kind === 'lease') {
    return leaseDays(lease, through).map((on, index) => ({
      ...paid(`lease-${index + 1}`, on, false),
      label: `Lease payment ${index + 1} of ${lease.termMonths}`,
      amountCents: negateCents(leasePayment(lease, index)),
      working: leaseWorking(lease, index, source),
    }));
  }
  const entries: UnplacedEntry[] = [];
  for (const cycle of cycles) {
    const on = addDays(cycle.to, -1);
    const year = purchaseYear(lease, on);
    if (year === null || cycle.productionWh === null || on > through) continue;
    const estimated = cycle.estimated === true;
    entries.push({
      ...paid(`lease-${cycle.to}`, on, estimated),
      label: 'Power bought from the roof’s owner',
      amountCents: negateCents(purchaseFor(lease, cycle.productionWh, year)),
      working: purchaseWorking(lease, { ...cycle, productionWh: cycle.productionWh }, year, source),
    });
  }
  return entries;
}

/** The days on which cycles end whose power was bought and whose production is not known: they are not counted, and the screen says so. */
export function leaseMissing(lease: LeaseFacts, cycles: readonly LeaseCycle[]): Day[] {
  if (lease.kind === 'lease') return [];
  return cycles
    .filter(({ to, productionWh }) => productionWh === null && purchaseYear(lease, addDays(to, -1)) !== null)
    .map(({ to }) => to);
}

/** A lease's payment on a day to come, negative. */
export type LeaseFlow = { on: Day; book: 'loan'; amountCents: Cents };

/** What a lease pays on the days of `[from, to)`; nothing for a power-purchase agreement, which `purchaseOfPeriod` works out by the month. */
export function leaseFlows(lease: LeaseFacts, from: Day, to: Day): LeaseFlow[] {
  if (lease.kind !== 'lease') return [];
  return leaseDays(lease, to).flatMap((on, index) =>
    on >= from && on < to ? [{ on, book: 'loan', amountCents: negateCents(leasePayment(lease, index)) }] : [],
  );
}

/** What the power made in a period that ends before `to` costs, negative; zero outside the term and for a lease. */
export function purchaseOfPeriod(lease: LeaseFacts, to: Day, production: Wh): Cents {
  const year = purchaseYear(lease, addDays(to, -1));
  return year === null ? ZERO_CENTS : negateCents(purchaseFor(lease, production, year));
}

/** The lease's payment `index` (from 0): raised once each twelve payments. */
export function leasePayment(lease: LeaseFacts, index: number): Cents {
  return roundToCents(usdOf(lease.monthlyCents).times(raised(lease, Math.floor(index / 12))));
}

function leaseDays(lease: LeaseFacts, through: Day): Day[] {
  const days: Day[] = [];
  while (days.length < lease.termMonths) {
    const on = addMonths(lease.firstPaymentOn, days.length);
    if (on > through) break;
    days.push(on);
  }
  return days;
}

function raised(lease: LeaseFacts, years: number) {
  return exact(lease.yearlyRise).plus(1).pow(years);
}

function purchaseFor(lease: LeaseFacts, production: Wh, year: number): Cents {
  return roundToCents(
    exact(lease.ratePerKwh ?? '0')
      .times(raised(lease, year))
      .times(kwhOf(production)),
  );
}

/** Which year of a power-purchase agreement a day lies in, from 0; null outside its term and for a lease. */
function purchaseYear(lease: LeaseFacts, on: Day): number | null {
  if (lease.kind === 'lease' || on < lease.firstPaymentOn) return null;
  const begun = monthsBetween(lease.firstPaymentOn, on);
  const months = addMonths(lease.firstPaymentOn, begun) > on ? begun - 1 : begun;
  return months < lease.termMonths ? Math.floor(months / 12) : null;
}

function paid(id: string, date: Day, estimated: boolean) {
  return { id, date, book: 'loan', kind: 'payment', basis: 'cash', estimated } as const;
}

function leaseWorking(lease: LeaseFacts, index: number, source: Source): Working {
  const years = Math.floor(index / 12);
  return {
    words: `${sayMoney(lease.monthlyCents)} a month${years === 0 ? '' : `, raised ${years} times by ${lease.yearlyRise}`}`,
    formula: '-roundCents(monthly * pow(1 + rise, years))',
    inputs: [
      usdInput('monthly', 'Payment of the first year', lease.monthlyCents, source),
      ...rise(lease, years, source),
    ],
    unit: 'USD',
    basis: 'computed',
  };
}

function purchaseWorking(
  lease: LeaseFacts,
  cycle: LeaseCycle & { productionWh: Wh },
  year: number,
  source: Source,
): Working {
  const rate = lease.ratePerKwh ?? '0';
  return {
    words: `${sayKwh(cycle.productionWh)} kWh at $${rate} per kWh${year === 0 ? '' : `, raised ${year} times by ${lease.yearlyRise}`}`,
    formula: '-roundCents(rate * pow(1 + rise, years) * production)',
    inputs: [
      plainInput('rate', 'Price of the first year', rate, 'USD/kWh', source),
      ...rise(lease, year, source),
      kwhInput('production', 'Production', cycle.productionWh, cycle.source ?? stated('Production of the cycle')),
    ],
    unit: 'USD',
    basis: cycle.estimated === true ? 'estimated' : 'computed',
  };
}

function rise(lease: LeaseFacts, years: number, source: Source) {
  return [
    plainInput('rise', 'Rise a year', lease.yearlyRise, 'fraction', source),
    plainInput('years', 'Times raised', String(years), 'times', stated('Years since the first payment')),
  ];
}
