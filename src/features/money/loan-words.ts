import type { LoanScheduleRow, LoanView } from '#shared/api/money-loan.ts';
import type { DayCount, LoanFacts, LoanSecurity } from '#shared/facts/finance.ts';
import { decimal, fullDate, money } from '#src/lib/format.ts';
import { percentOfFraction, percentWords } from '#src/lib/typed-values.ts';

export const DAY_COUNTS: Record<DayCount, string> = {
  '30/360': 'by months of 30 days (30/360)',
  'actual/365': 'by the days that pass, 365 to a year',
  'actual/360': 'by the days that pass, 360 to a year',
};

export const SECURITIES: Record<LoanSecurity, string> = {
  unknown: 'not stated',
  unsecured: 'by nothing',
  personalProperty: 'by the equipment, as personal property',
  fixtureFiling: 'by a fixture filing against the home',
  secondMortgage: 'by a second mortgage on the home',
  propertyAssessment: 'by an assessment on the property tax',
};

/** Securities that a mortgage servicer may count as a lien on the home. */
export function mayBeLien(security: LoanSecurity): boolean {
  return security === 'fixtureFiling' || security === 'secondMortgage' || security === 'propertyAssessment';
}

export const LEVEL_REASONS: Record<LoanView['levels'][number]['reason'], string> = {
  start: 'from the start',
  promotionEnd: 'when the promotion ends',
  prepayment: 'worked out anew by what was prepaid',
  reamortized: 're-amortized by the lender',
};

const PROMOTIONS: Record<NonNullable<LoanFacts['promotion']>['payment'], string> = {
  level: 'level payments',
  interest: 'interest alone',
  none: 'no payments, the interest joins the principal at the end',
};

export function promotionWords({ promotion }: LoanFacts): string {
  if (promotion === null) return 'none';
  return `${promotion.months} months at ${percentWords(promotion.annualRate)}: ${PROMOTIONS[promotion.payment]}`;
}

export function prepaymentWords({ assumedPrepayment }: LoanFacts): string {
  if (assumedPrepayment === null) return 'none taken for granted';
  return `${money(assumedPrepayment.amountCents)} by payment ${assumedPrepayment.byPayment}`;
}

/** A rate a year to two decimals, "7.63%": more would say more than is known. */
export function aprWords(apr: string): string {
  const [whole = '0', rest = ''] = percentOfFraction(apr).split('.');
  const hundredths = Number(`${whole}${rest.padEnd(3, '0').slice(0, 2)}`) + (Number(rest[2] ?? '0') >= 5 ? 1 : 0);
  return `${decimal(`${Math.floor(hundredths / 100)}.${String(hundredths % 100).padStart(2, '0')}`)}%`;
}

/** What the chart shows, for those who cannot see it. */
export function chartSummary(loan: LoanView): string {
  const whole = `The whole schedule pays ${money(loan.interest.amountCents)} of interest`;
  const ofMost = (row: LoanScheduleRow) => row.principalCents - row.extraPrincipalCents > row.interestCents;
  const paying = loan.schedule.filter((row) => row.payment.amountCents > 0 && !row.refinanced);
  const turned = paying.findLastIndex((row) => !ofMost(row) && row.principalCents !== row.extraPrincipalCents) + 1;
  const turn = turned > 0 ? paying[turned] : undefined;
  const when = turn ? `; from ${fullDate(turn.on)} a payment is more principal than interest` : '';
  return `${whole}${when}. ${loan.clearedOn ? `It ends on ${fullDate(loan.clearedOn)}.` : ''}`.trim();
}
