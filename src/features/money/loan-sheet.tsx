import { Link } from 'react-router-dom';
import type { MoneyView } from '#shared/api/money.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { percentWords } from '#src/lib/typed-values.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FactsList } from './facts-list.tsx';

/** The loan in short, on Money: the payment, what it takes to pay it off, what was paid. The rest is on its own page. */
export function LoanSheet({ loan, householdId }: { loan: NonNullable<MoneyView['loan']>; householdId: string }) {
  const { facts } = loan;
  return (
    <Sheet
      title="The loan"
      hint={`${facts.lender === '' ? 'The lender' : facts.lender}, ${money(facts.principalCents)} at ${percentWords(facts.annualRate)} over ${facts.termMonths} months.`}
      actions={
        <Link className="link inline-flex min-h-11 items-center sm:min-h-6" to={`/h/${householdId}/money/loan`}>
          The whole loan
        </Link>
      }
    >
      <FactsList
        rows={[
          { label: 'Next payment', value: money(loan.paymentCents), hint: 'by schedule' },
          {
            label: `Payoff on ${fullDate(loan.payoffOn)}`,
            value: (
              <MoneyFigure
                title={`Payoff on ${fullDate(loan.payoffOn)}`}
                cents={loan.payoffCents}
                working={loan.payoff.working}
              />
            ),
            hint: 'Principal, accrued interest and the contract’s fee, as computed. The servicer’s own quote counts.',
          },
          { label: 'Paid so far', value: money(loan.paidCents) },
          { label: <span className="pl-5">interest so far</span>, value: money(loan.interestPaidCents) },
          ...(facts.dealerFeeCents > 0
            ? [{ label: 'Dealer fee inside the principal', value: money(facts.dealerFeeCents) }]
            : []),
          ...(loan.lastPaymentOn ? [{ label: 'Last payment', value: fullDate(loan.lastPaymentOn) }] : []),
        ]}
      />
      <p className="hint mt-3">
        Its schedule, your contract, payments as made, the lender’s balances and the payoff on any day are on{' '}
        <Link className="underline underline-offset-3" to={`/h/${householdId}/money/loan`}>
          the loan’s own page
        </Link>
        .
      </p>
    </Sheet>
  );
}
