import { useState } from 'react';
import type { OtherLoanView, OtherMoneyView } from '#shared/api/money-other.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { percentWords } from '#src/lib/typed-values.ts';
import { Button } from '#src/ui/button.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FactsList } from './facts-list.tsx';
import { EnterLease, LeasePart } from './other-lease.tsx';
import { OtherLoanDialog, OtherPaymentDialog } from './other-loan-dialog.tsx';
import { OtherRemove } from './other-remove.tsx';
import { OTHER_KINDS } from './other-values.ts';
import { PaperLink } from './paper-link.tsx';

type Given = { householdId: string; canEdit: boolean; today: string };

/** Money for the roof from elsewhere: a share of the mortgage, a home-equity loan, a lease or power purchase. */
export function OtherSheet({ view, ...given }: { view: OtherMoneyView } & Given) {
  const [adding, setAdding] = useState(false);
  const { householdId, canEdit } = given;
  const none = view.loans.length === 0 && view.lease === null;
  return (
    <Sheet
      title="Other money for the roof"
      hint={
        none
          ? 'None is entered. A share of a mortgage, refinance or home-equity loan stands here, and so does a lease or a power purchase.'
          : undefined
      }
    >
      {view.loans.map((loan) => (
        <LoanPart key={loan.id} loan={loan} {...given} />
      ))}
      {view.lease !== null && <LeasePart lease={view.lease} householdId={householdId} canEdit={canEdit} />}
      {canEdit && (
        <div className="no-print mt-4 flex flex-wrap gap-3">
          <Button look="plain" onClick={() => setAdding(true)}>
            Enter a loan
          </Button>
          {view.lease === null && <EnterLease householdId={householdId} />}
        </div>
      )}
      {adding && <OtherLoanDialog loan={null} householdId={householdId} onClose={() => setAdding(false)} />}
    </Sheet>
  );
}

function LoanPart({ loan, householdId, canEdit, today }: { loan: OtherLoanView } & Given) {
  const [open, setOpen] = useState<'terms' | 'payment' | null>(null);
  const { facts } = loan;
  const name = facts.lender === '' ? OTHER_KINDS[loan.kind] : facts.lender;
  return (
    <section className="mt-6">
      <h3>
        {name}
        {facts.lender !== '' && <span className="font-normal">, {OTHER_KINDS[loan.kind]}</span>}
      </h3>
      <FactsList
        rows={[
          {
            label: 'Principal for the roof',
            value: money(facts.principalCents),
            hint: `${percentWords(facts.annualRate)} over ${facts.termMonths} months, funded ${fullDate(facts.fundedOn)}`,
          },
          ...(facts.dealerFeeCents === 0
            ? []
            : [{ label: 'Dealer fee inside it', value: money(facts.dealerFeeCents) }]),
          { label: 'Payment a month', value: money(loan.paymentCents) },
          { label: 'Paid so far', value: money(loan.paidCents) },
          ...(loan.lastPaymentOn === null ? [] : [{ label: 'Last payment', value: fullDate(loan.lastPaymentOn) }]),
          {
            label: `To pay it off on ${fullDate(loan.payoffOn)}`,
            value: (
              <MoneyFigure title={`Payoff, ${name}`} cents={loan.payoff.amountCents} working={loan.payoff.working} />
            ),
            total: true,
          },
        ]}
      />
      <p className="hint mt-2">The lender’s own quote for the day is the one to pay by.</p>
      <PaperLink householdId={householdId} documentId={facts.documentId} />
      {facts.payments.length > 0 && (
        <ul className="mt-3 border-t border-rule">
          {facts.payments.map((payment) => (
            <li
              key={payment.id}
              className="flex flex-wrap items-baseline justify-between gap-x-5 border-b border-rule py-2"
            >
              <span>
                {fullDate(payment.on)}
                {payment.extraPrincipalCents > 0 && (
                  <span className="hint">, {money(payment.extraPrincipalCents)} of it extra principal</span>
                )}
                {payment.note && <span className="hint">, {payment.note}</span>}
              </span>
              <span className="ml-auto flex items-baseline gap-4">
                {canEdit && (
                  <OtherRemove
                    what={`the payment of ${fullDate(payment.on)}`}
                    householdId={householdId}
                    change={{ kind: 'removePayment', id: loan.id, paymentId: payment.id }}
                  />
                )}
                <span className="min-w-20 text-right">{money(payment.amountCents)}</span>
              </span>
            </li>
          ))}
        </ul>
      )}
      {canEdit && (
        <p className="no-print mt-2 flex flex-wrap items-center gap-x-5">
          <button type="button" className="link min-h-11" onClick={() => setOpen('payment')}>
            Record a payment
            <span className="visually-hidden"> to {name}</span>
          </button>
          <button type="button" className="link min-h-11" onClick={() => setOpen('terms')}>
            Change
            <span className="visually-hidden"> {name}</span>
          </button>
          <OtherRemove what={name} householdId={householdId} change={{ kind: 'removeLoan', id: loan.id }} />
        </p>
      )}
      {open === 'terms' && <OtherLoanDialog loan={loan} householdId={householdId} onClose={() => setOpen(null)} />}
      {open === 'payment' && (
        <OtherPaymentDialog loanId={loan.id} householdId={householdId} today={today} onClose={() => setOpen(null)} />
      )}
    </section>
  );
}
