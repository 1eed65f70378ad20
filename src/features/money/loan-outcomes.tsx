import { fullDate, money } from '#src/lib/format.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import type { LoanProps } from './loan-props.ts';

const OUTCOMES = {
  whole: 'All of it',
  part: 'Half of it',
  nothing: 'Nothing',
} as const;

/** A contract that takes a prepayment for granted: what becomes of the payment if it is made, half made, or not. */
export function LoanOutcomes({ loan }: LoanProps) {
  const assumed = loan.facts.assumedPrepayment;
  if (assumed === null || loan.prepaymentOn === null) return null;
  return (
    <Sheet
      title={`If ${money(assumed.amountCents)} is prepaid by ${fullDate(loan.prepaymentOn)}, or not`}
      hint={`The payment takes it for granted and is worked out anew with payment ${assumed.byPayment}. By the contract and the regular payments as recorded; all prepaid with that payment.`}
    >
      <table className="ruled ruled-stack">
        <thead>
          <tr>
            <th scope="col">Prepaid</th>
            <th scope="col">Amount</th>
            <th scope="col">Payment afterwards</th>
            <th scope="col">Interest in all</th>
            <th scope="col">Last payment</th>
          </tr>
        </thead>
        <tbody>
          {loan.outcomes.map((outcome) => (
            <tr key={outcome.prepaid}>
              <th scope="row">{OUTCOMES[outcome.prepaid]}</th>
              <td data-label="Amount">{money(outcome.prepaidCents)}</td>
              <td data-label="Payment afterwards">
                {outcome.next && (
                  <MoneyFigure
                    title={`Payment afterwards, ${OUTCOMES[outcome.prepaid].toLowerCase()} prepaid`}
                    cents={outcome.next.amountCents}
                    working={outcome.next.working}
                  />
                )}
              </td>
              <td data-label="Interest in all">
                <MoneyFigure
                  title={`Interest in all, ${OUTCOMES[outcome.prepaid].toLowerCase()} prepaid`}
                  cents={outcome.interest.amountCents}
                  working={outcome.interest.working}
                />
              </td>
              <td data-label="Last payment">{fullDate(outcome.clearedOn)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </Sheet>
  );
}
