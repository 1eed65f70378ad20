import { useState } from 'react';
import { dollarsText } from '#shared/units/cents.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { Button } from '#src/ui/button.tsx';
import { Field } from '#src/ui/field.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { Tick } from '#src/ui/ticks.tsx';
import { LoanLine, LoanList, LoanRemove } from './loan-list.tsx';
import type { LoanProps } from './loan-props.ts';
import { type LoanPaymentBody, useLoanChange } from './loan-queries.ts';
import { type PaymentValues, readPayment } from './loan-values.ts';
import { PaperField } from './paper-field.tsx';
import { PaperLink } from './paper-link.tsx';

/** Payments that were not as scheduled, newest first. */
export function LoanPayments({ loan, householdId, canEdit, today }: LoanProps) {
  const [recording, setRecording] = useState(false);
  const rows = [...loan.facts.payments].sort((a, b) => (a.on < b.on ? 1 : -1));
  return (
    <Sheet title="Payments as made" hint="A month without a record is taken as paid to schedule.">
      <LoanList empty="None recorded.">
        {rows.map((payment) => (
          <LoanLine
            key={payment.id}
            amount={money(payment.amountCents)}
            remove={
              canEdit && (
                <LoanRemove
                  what={`the payment of ${fullDate(payment.on)}`}
                  householdId={householdId}
                  change={{ kind: 'removePayment', id: payment.id }}
                />
              )
            }
          >
            {fullDate(payment.on)}{' '}
            <span className="hint">
              {payment.extraPrincipalCents > 0 && `of it ${money(payment.extraPrincipalCents)} extra principal. `}
              {payment.reamortize && 'Re-amortized. '}
              {payment.note}
            </span>{' '}
            <PaperLink householdId={householdId} documentId={payment.documentId} />
          </LoanLine>
        ))}
      </LoanList>
      {canEdit && (
        <p className="no-print mt-4">
          <Button look="plain" onClick={() => setRecording(true)}>
            Record a payment
          </Button>
        </p>
      )}
      {recording && (
        <PaymentDialog
          householdId={householdId}
          today={today}
          amount={loan.next ? dollarsText(loan.next.payment.amountCents) : ''}
          onClose={() => setRecording(false)}
        />
      )}
    </Sheet>
  );
}

function PaymentDialog({
  householdId,
  today,
  amount,
  onClose,
}: {
  householdId: string;
  today: string;
  amount: string;
  onClose: () => void;
}) {
  const change = useLoanChange(householdId);
  return (
    <SaveDialog<PaymentValues, LoanPaymentBody>
      title="Record a loan payment"
      hint="It stands in for the scheduled payment of its month, unless all of it is extra principal."
      defaults={{
        on: today,
        amountCents: amount,
        extraPrincipalCents: '',
        reamortize: false,
        note: '',
        documentId: '',
      }}
      read={readPayment}
      save={(body) => change.mutateAsync({ kind: 'addPayment', body })}
      onClose={onClose}
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
            {...register('amountCents', { deps: ['extraPrincipalCents'] })}
          />
          <Field
            label="Extra principal in it"
            unit="$"
            hint="what went beyond the regular payment; leave empty for none"
            inputMode="decimal"
            error={errors.extraPrincipalCents?.message}
            {...register('extraPrincipalCents')}
          />
          <Tick
            label="The lender re-amortized the loan"
            hint="A new level payment over the months that remain. Without it the payment stays and the loan ends sooner. It must be asked for; the lender says whether it is done."
            checked={watch('reamortize')}
            onChange={(on) => setValue('reamortize', on, { shouldDirty: true })}
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
    </SaveDialog>
  );
}
