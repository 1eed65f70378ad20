import { sayCount, sayMoney } from '../ledger/say.ts';
import { type Cents, cents } from '../units/cents.ts';
import type { Source, Working } from '../working.ts';
import { plainInput, stated, usdInput } from './inputs.ts';
import type { LoanLevel } from './loan-step.ts';

// Nothing here may need exact decimals: the screen builds these workings too.

export const LOAN_TERMS = stated('Loan terms as entered');
const SCHEDULE = stated('Loan schedule');

/** What a working states: the payment as it stands in the schedule, or as money that goes out. */
export type PaymentSign = '' | '-';

type LevelFacts = Pick<LoanLevel, 'balanceCents' | 'annualRate' | 'months' | 'assumed' | 'paymentCents' | 'reason'>;

/** How a level payment comes about: the annuity of what is owed, less the discounted prepayment that the contract takes for granted. */
export function levelWorking(level: LevelFacts, sign: PaymentSign = ''): Working {
  const { assumed } = level;
  const isFree = /^-?0*(\.0*)?$/.test(level.annualRate);
  const owed = assumed ? `max(0, balance - assumed * pow(1 + rate / 12, -payments))` : 'balance';
  const inputs = [
    usdInput('balance', level.reason === 'start' ? 'Principal' : 'Principal left', level.balanceCents, LOAN_TERMS),
  ];
  if (!isFree || assumed) inputs.push(plainInput('rate', 'Rate a year', level.annualRate, 'fraction', LOAN_TERMS));
  inputs.push(
    plainInput('months', level.reason === 'start' ? 'Term' : 'Months left', String(level.months), 'months', LOAN_TERMS),
  );
  if (assumed) {
    inputs.push(
      usdInput('assumed', 'Prepayment the contract takes for granted', assumed.amountCents, LOAN_TERMS),
      plainInput('payments', 'Payments until it', String(assumed.withPayment), '', LOAN_TERMS),
    );
  }
  const but = assumed
    ? `, if ${sayMoney(assumed.amountCents)} is prepaid with payment ${assumed.withPayment} from there`
    : '';
  return {
    words: `Level payment of ${sayMoney(level.paymentCents)} over ${sayCount(level.months, 'month', 'months')}${but}`,
    formula: isFree
      ? `${sign}roundCents(${owed} / months)`
      : `${sign}roundCents(${owed} * (rate / 12) / (1 - pow(1 + rate / 12, -months)))`,
    inputs,
    unit: 'USD',
    basis: 'computed',
  };
}

/** A payment that is neither level nor recorded: what clears the loan, or the interest of a promotion's month. */
export function restWorking(
  step: { interestDueCents: Cents; principalCents: Cents; balanceBeforeCents: Cents },
  sign: PaymentSign = '',
): Working {
  const clears = step.principalCents === step.balanceBeforeCents;
  const interest = usdInput('interest', 'Interest due', step.interestDueCents, SCHEDULE);
  if (!clears) {
    return {
      words: `The ${sayMoney(step.interestDueCents)} of interest due, and no principal`,
      formula: `${sign}interest`,
      inputs: [interest],
      unit: 'USD',
      basis: 'computed',
    };
  }
  return {
    words: `The last ${sayMoney(step.balanceBeforeCents)} of principal and ${sayMoney(step.interestDueCents)} of interest`,
    formula: `${sign}(balance + interest)`,
    inputs: [usdInput('balance', 'Principal left', step.balanceBeforeCents, SCHEDULE), interest],
    unit: 'USD',
    basis: 'computed',
  };
}

type Paid = { interestCents: Cents; regularCents: Cents; extraPrincipalCents: Cents };

/** The regular part of a payment as it was made. */
export function recordedWorking(paid: Paid & { amountCents: Cents }, record: Source, sign: PaymentSign = ''): Working {
  return {
    words: `${sayMoney(paid.regularCents)} paid: ${sayMoney(paid.interestCents)} interest, the rest principal`,
    formula: `${sign}(paid - extra)`,
    inputs: [
      usdInput('paid', 'Paid', paid.amountCents, record),
      usdInput('extra', 'Of it extra principal', paid.extraPrincipalCents, record),
    ],
    unit: 'USD',
    basis: 'entered',
  };
}

export function extraWorking(extraPrincipalCents: Cents, record: Source, sign: PaymentSign = ''): Working {
  return {
    words: `${sayMoney(extraPrincipalCents)} paid beyond the regular payment, all of it principal`,
    formula: `${sign}extra`,
    inputs: [usdInput('extra', 'Extra principal', extraPrincipalCents, record)],
    unit: 'USD',
    basis: 'entered',
  };
}

/** What a refinance left to pay in cash, or paid out. */
export function refinanceWorking(principalCents: Cents, payoffCents: Cents, on: string, record: Source): Working {
  const over = cents(principalCents - payoffCents);
  const what = over < 0 ? `${sayMoney(cents(-over))} paid beside it` : `${sayMoney(over)} paid out`;
  return {
    words: `The new loan of ${sayMoney(principalCents)} paid ${sayMoney(payoffCents)} to the old lender; ${what}`,
    formula: 'principal - payoff',
    inputs: [
      usdInput('principal', 'The new loan', principalCents, record),
      usdInput('payoff', `Payoff of the old loan on ${on}`, payoffCents, SCHEDULE),
    ],
    unit: 'USD',
    basis: 'computed',
  };
}

export function refinanceCostsWorking(costsCents: Cents, record: Source): Working {
  return {
    words: 'Costs of the refinance paid in cash',
    formula: '-costs',
    inputs: [usdInput('costs', 'Costs', costsCents, record)],
    unit: 'USD',
    basis: 'entered',
  };
}
