import type { Appraisal, MortgageFacts } from '../facts/finance.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import { addCents, type Cents, subtractCents, sumCents } from '../units/cents.ts';
import { addMonths, type Day, monthsBetween } from '../units/day.ts';
import { Exact } from '../units/rate.ts';
import { stated, usdInput, usdListInput } from './inputs.ts';
import { lastPaymentBy, mortgageBook, statedBeforeFirst } from './mortgage-balance.ts';
import { type PaperName, sourceOfPaper } from './paper-source.ts';

/** The last value stated by a day. `evidence` leaves the owner's own estimates out: a servicer takes an appraisal or a broker's opinion. */
export function latestValue(mortgage: MortgageFacts, on: Day, evidence = false): Appraisal | null {
  return mortgage.appraisals
    .filter((one) => one.on <= on && !(evidence && one.how === 'ownEstimate'))
    .reduce<Appraisal | null>((last, one) => (last === null || one.on >= last.on ? one : last), null);
}

/** Balance in percent of a value, to two decimals and never downwards: what is above a threshold never looks as if it were at it. */
export function ltvPercent(balanceCents: Cents, valueCents: Cents): string {
  return new Exact(balanceCents).times(100).div(valueCents).toDecimalPlaces(2, Exact.ROUND_UP).toString();
}

/** Whole months since the loan began, a month before its first payment. */
export function monthsSinceStart(mortgage: MortgageFacts, on: Day): number {
  const start = addMonths(mortgage.firstPaymentOn, -1);
  const months = monthsBetween(start, on);
  return addMonths(start, months) > on ? months - 1 : months;
}

/** The balance on a day: the last the lender stated, else the principal, less the principal of the payments since. The mortgage is paid to schedule. */
export function mortgageBalanceOn(mortgage: MortgageFacts, on: Day, papers: readonly PaperName[] = []): Figure {
  const number = lastPaymentBy(mortgage, on);
  const rows = mortgageBook(mortgage).actual.slice(0, number);
  const at = rows.findLastIndex((row) => row.stated !== null && row.stated.on <= on);
  const statement = rows[at]?.stated ?? statedBeforeFirst(mortgage, on);
  const from = statement?.balanceCents ?? mortgage.principalCents;
  const since = rows.slice(at + 1);
  // A statement of the same month dated after this day does not count yet.
  const paid = since.map((row) => addCents(row.principalCents, row.extraPrincipalCents));
  return {
    amountCents: subtractCents(from, sumCents(paid)),
    working: {
      words:
        statement === null
          ? `${sayMoney(from)} less the principal of ${paid.length} payments to ${sayDate(on)}`
          : `${sayMoney(from)} by the lender’s statement of ${sayDate(statement.on)}, less the principal of ${paid.length} payments since`,
      formula: 'from - sum(paid)',
      inputs: [
        usdInput(
          'from',
          statement === null ? 'Principal' : `Balance stated on ${sayDate(statement.on)}`,
          from,
          statement === null
            ? sourceOfPaper(mortgage.documentId, papers, stated('Mortgage as entered'))
            : sourceOfPaper(statement.documentId, papers, stated('Lender’s statement as entered')),
        ),
        usdListInput('paid', `Principal of ${paid.length} payments`, paid, stated('Mortgage schedule')),
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}
