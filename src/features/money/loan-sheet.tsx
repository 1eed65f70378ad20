import { useState } from 'react';
import type { MoneyView } from '#shared/api/money.ts';
import type { Cents } from '#shared/units/cents.ts';
import { dollarsText } from '#shared/units/cents.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { percentWords } from '#src/lib/typed-values.ts';
import { Button } from '#src/ui/button.tsx';
import { Field } from '#src/ui/field.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FactsList } from './facts-list.tsx';
import { LoanSchedule } from './loan-schedule.tsx';
import { type LoanPaymentValues, readLoanPayment } from './money-values.ts';
import { PaperField } from './paper-field.tsx';
import { RecordDialog } from './record-dialog.tsx';
import { RemoveButton } from './remove-button.tsx';

type Loan = NonNullable<MoneyView['loan']>;

/** The loan: what it takes to pay it off, what was paid, the payments as made, the schedule. */
export function LoanSheet({
  loan,
  householdId,
  canEdit,
  today,
}: {
  loan: Loan;
  householdId: string;
  canEdit: boolean;
  today: string;
}) {
  const [recording, setRecording] = useState(false);
  const { facts } = loan;
  const principalPaid = (loan.paidCents - loan.interestPaidCents) as Cents;
  return (
    <Sheet
      title="The loan"
      hint={`${facts.lender === '' ? 'The lender' : facts.lender}, ${money(facts.principalCents)} at ${percentWords(facts.annualRate)} over ${facts.termMonths} months.`}
    >
      <FactsList
        rows={[
          { label: 'Level payment', value: money(loan.paymentCents), hint: 'each month' },
          {
            label: `Payoff on ${fullDate(loan.payoffOn)}`,
            value: (
              <MoneyFigure
                title={`Payoff on ${fullDate(loan.payoffOn)}`}
                cents={loan.payoffCents}
                working={loan.payoff.working}
              />
            ),
            hint: 'Principal and accrued interest as computed. The servicer’s own quote counts.',
          },
          { label: 'Paid so far', value: money(loan.paidCents) },
          { label: <span className="pl-5">of it interest</span>, value: money(loan.interestPaidCents) },
          { label: <span className="pl-5">of it principal</span>, value: money(principalPaid) },
          ...(facts.dealerFeeCents > 0
            ? [
                {
                  label: 'Dealer fee inside the principal',
                  value: money(facts.dealerFeeCents),
                  hint: 'Part of the loan, not a cost of its own, and no part of the tax credit.',
                },
              ]
            : []),
          ...(loan.lastPaymentOn ? [{ label: 'Last payment', value: fullDate(loan.lastPaymentOn) }] : []),
        ]}
      />
      <h3 className="mt-6">Payments as made</h3>
      <p className="hint">A month without a record is taken as paid to schedule.</p>
      <ul className="mt-1 border-t border-rule">
        {facts.payments.map((payment) => (
          <li
            key={payment.id}
            className="flex flex-wrap items-baseline justify-between gap-x-5 border-b border-rule py-2"
          >
            <span>
              {fullDate(payment.on)}
              {payment.extraPrincipalCents > 0 && (
                <span className="hint">, of it {money(payment.extraPrincipalCents)} extra principal</span>
              )}
              {payment.note && <span className="hint block">{payment.note}</span>}
            </span>
            <span className="ml-auto flex items-baseline gap-4">
              {canEdit && (
                <RemoveButton
                  what={`the payment of ${fullDate(payment.on)}`}
                  householdId={householdId}
                  change={{ kind: 'removeLoanPayment', id: payment.id }}
                />
              )}
              <span className="min-w-20 text-right">{money(payment.amountCents)}</span>
            </span>
          </li>
        ))}
        {facts.payments.length === 0 && <li className="border-b border-rule py-2 text-soft">None recorded.</li>}
      </ul>
      {canEdit && (
        <p className="no-print mt-4">
          <Button look="plain" onClick={() => setRecording(true)}>
            Record a payment
          </Button>
        </p>
      )}
      <LoanSchedule loan={loan} />
      {recording && (
        <RecordDialog<LoanPaymentValues, ReturnOk>
          title="Record a loan payment"
          hint="It stands in for the scheduled payment of its month."
          householdId={householdId}
          defaults={{
            on: today,
            amountCents: dollarsText(loan.paymentCents),
            extraPrincipalCents: '',
            note: '',
            documentId: '',
          }}
          read={readLoanPayment}
          change={(body) => ({ kind: 'loanPayment', body })}
          onClose={() => setRecording(false)}
        >
          {({ register, watch, setValue, formState: { errors } }) => (
            <>
              <Field label="Paid on" type="date" error={errors.on?.message} {...register('on')} />
              <Field
                label="Amount"
                unit="$"
                hint="all of it, extra principal included"
                inputMode="decimal"
                error={errors.amountCents?.message}
                {...register('amountCents')}
              />
              <Field
                label="Extra principal in it"
                unit="$"
                hint="what went beyond the regular payment; leave empty for none"
                inputMode="decimal"
                error={errors.extraPrincipalCents?.message}
                {...register('extraPrincipalCents')}
              />
              <Field label="Note" maxLength={200} {...register('note')} />
              <PaperField
                householdId={householdId}
                value={watch('documentId')}
                error={errors.documentId?.message}
                onChange={(id) => setValue('documentId', id, { shouldDirty: true })}
              />
            </>
          )}
        </RecordDialog>
      )}
    </Sheet>
  );
}

type ReturnOk = Extract<ReturnType<typeof readLoanPayment>, { ok: true }>['body'];
