import type { OtherLoanBody, OtherLoanView } from '#shared/api/money-other.ts';
import { Field, SelectField } from '#src/ui/field.tsx';
import { OtherDialog } from './other-dialog.tsx';
import type { PaymentBody } from './other-queries.ts';
import {
  OTHER_KINDS,
  type OtherLoanValues,
  otherLoanValues,
  type PaymentValues,
  readOtherLoan,
  readPayment,
} from './other-values.ts';
import { PaperField } from './paper-field.tsx';

/** Enters another loan that paid for the roof, or changes its terms. */
export function OtherLoanDialog({
  loan,
  householdId,
  onClose,
}: {
  /** Null enters a new one. */
  loan: OtherLoanView | null;
  householdId: string;
  onClose: () => void;
}) {
  return (
    <OtherDialog<OtherLoanValues, OtherLoanBody>
      title={loan === null ? 'Other money for the roof' : 'Change this loan'}
      hint="The roof’s share alone: its part of the principal, and the payments on that part. Its interest is not told apart from a mortgage’s at tax time; ask whoever prepares the return."
      householdId={householdId}
      defaults={otherLoanValues(loan)}
      read={readOtherLoan}
      change={(body) => (loan === null ? { kind: 'addLoan', body } : { kind: 'changeLoan', id: loan.id, body })}
      onClose={onClose}
    >
      {({ register, watch, setValue, formState: { errors } }) => (
        <>
          <SelectField label="Kind" error={errors.kind?.message} {...register('kind')}>
            {Object.entries(OTHER_KINDS).map(([kind, words]) => (
              <option key={kind} value={kind}>
                {words}
              </option>
            ))}
          </SelectField>
          <Field label="Lender" maxLength={120} error={errors.lender?.message} {...register('lender')} />
          <Field
            label="Principal for the roof"
            unit="$"
            inputMode="decimal"
            error={errors.principalCents?.message}
            {...register('principalCents')}
          />
          <Field
            label="Dealer fee inside it"
            hint="Leave empty for none."
            unit="$"
            inputMode="decimal"
            error={errors.dealerFeeCents?.message}
            {...register('dealerFeeCents')}
          />
          <Field
            label="Rate a year"
            unit="%"
            inputMode="decimal"
            error={errors.annualRate?.message}
            {...register('annualRate')}
          />
          <Field
            label="Term"
            unit="months"
            inputMode="numeric"
            error={errors.termMonths?.message}
            {...register('termMonths')}
          />
          <Field label="Funded on" type="date" error={errors.fundedOn?.message} {...register('fundedOn')} />
          <Field
            label="First payment on"
            type="date"
            error={errors.firstPaymentOn?.message}
            {...register('firstPaymentOn')}
          />
          <PaperField
            householdId={householdId}
            value={watch('documentId')}
            error={errors.documentId?.message}
            onChange={(id) => setValue('documentId', id, { shouldDirty: true })}
          />
        </>
      )}
    </OtherDialog>
  );
}

/** Records a payment of another loan as it was made. */
export function OtherPaymentDialog({
  loanId,
  householdId,
  today,
  onClose,
}: {
  loanId: string;
  householdId: string;
  today: string;
  onClose: () => void;
}) {
  return (
    <OtherDialog<PaymentValues, PaymentBody>
      title="Record a payment"
      hint="Where the month’s payment was not the scheduled one. A month without a record is taken as paid to schedule."
      householdId={householdId}
      defaults={{ on: today, amountCents: '', extraPrincipalCents: '', note: '', documentId: '' }}
      read={readPayment}
      change={(body) => ({ kind: 'addPayment', id: loanId, body })}
      onClose={onClose}
    >
      {({ register, watch, setValue, formState: { errors } }) => (
        <>
          <Field label="Paid on" type="date" error={errors.on?.message} {...register('on')} />
          <Field
            label="Amount"
            hint="All of it, extra principal included."
            unit="$"
            inputMode="decimal"
            error={errors.amountCents?.message}
            {...register('amountCents')}
          />
          <Field
            label="Extra principal in it"
            hint="What went beyond the regular payment; leave empty for none."
            unit="$"
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
    </OtherDialog>
  );
}
