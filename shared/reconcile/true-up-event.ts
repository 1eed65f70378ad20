import { sayMoney } from '../ledger/say.ts';
import { sumCents } from '../units/cents.ts';
import { Exact, exact } from '../units/rate.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { nothingToCompare } from './make-check.ts';

/**
 * At a true-up, or where credit runs out, what left the bank is what the plan says leaves it. Where the statement prints the bank's close that is the bank's own check: this
 * one agrees with it and says what left, or stays silent where that one differs.
 */
export function trueUpChecks({ settled, paper }: CheckContext, others: readonly Check[]): Check[] {
  if (settled.plan === null || settled.asBilled === null || paper.split !== null) return [];
  const { settlement } = settled.asBilled;
  return settled.plan.plan.banks.flatMap((bank) => {
    const moves = settlement.banks.filter((one) => one.bank === bank.id).map((one) => one.move);
    const expired = sumOf(moves.map((move) => move.expired));
    const paid = sumOf(moves.map((move) => move.paid));
    if (expired.isZero() && paid.isZero()) return [];
    const about = `trueUp.${bank.id}`;
    const title = `Credit paid or expired: ${bank.label}`;
    const left = [
      expired.isZero() ? null : `${amountWords(expired, bank.unit)} expired`,
      paid.isZero() ? null : `${amountWords(paid, bank.unit)} was paid for`,
    ].filter((part) => part !== null);
    const apart = sumCents(
      settlement.payouts.filter((payout) => payout.kind === 'trueup').map((payout) => payout.amountCents),
    );
    const cheque = apart === 0 ? null : `${sayMoney(apart)} should come apart from the bill.`;
    const close = others.find((check) => check.key === `bankChain:${bank.id}.close`);
    if (close?.verdict === 'differs') return [];
    if (close?.verdict === 'agrees') {
      const check = { ...close, check: 'nothingLost' as const, about, key: `nothingLost:${about}`, title };
      return [
        {
          ...check,
          cause: `By the plan ${left.join(' and ')}, and the balance printed after it is right.`,
          advice: cheque,
        },
      ];
    }
    return [
      nothingToCompare('nothingLost', about, bank.unit, {
        title,
        cause: `By the plan ${left.join(' and ')} in this cycle; the statement prints no balance to compare.`,
        advice: cheque ?? 'Ask the utility for the balance after this cycle.',
      }),
    ];
  });
}

function sumOf(values: readonly string[]): Exact {
  return values.reduce((sum, value) => sum.plus(exact(value)), new Exact(0));
}

function amountWords(amount: Exact, unit: 'kWh' | 'USD'): string {
  return unit === 'kWh' ? `${amount.toString()} kWh` : `$${amount.toString()}`;
}
