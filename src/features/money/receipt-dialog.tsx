import { Field } from '#src/ui/field.tsx';
import { type ReceiptValues, readReceipt } from './money-values.ts';
import { PaperField } from './paper-field.tsx';
import { RecordDialog } from './record-dialog.tsx';

type ReceiptBody = Extract<ReturnType<typeof readReceipt>, { ok: true }>['body'];

/** Records a cheque or transfer from the incentive's payer, with the days and kWh it says it pays. */
export function ReceiptDialog({
  householdId,
  today,
  onClose,
}: {
  householdId: string;
  today: string;
  onClose: () => void;
}) {
  return (
    <RecordDialog<ReceiptValues, ReceiptBody>
      title="Record money received"
      hint="As it came: by cheque or transfer, on the day it came. The days and kWh it pays are on its letter; with them it is checked against the production meter."
      householdId={householdId}
      defaults={{ on: today, amountCents: '', note: '', from: '', to: '', quantityWh: '', documentId: '' }}
      read={readReceipt}
      change={(body) => ({ kind: 'receipt', body })}
      onClose={onClose}
    >
      {({ register, watch, setValue, formState: { errors } }) => (
        <>
          <Field label="Received on" type="date" error={errors.on?.message} {...register('on')} />
          <Field
            label="Amount"
            unit="$"
            inputMode="decimal"
            error={errors.amountCents?.message}
            {...register('amountCents')}
          />
          <div className="grid gap-x-6 sm:grid-cols-2">
            <Field
              label="Covers from"
              type="date"
              hint="the first day it pays for"
              error={errors.from?.message}
              {...register('from', { deps: ['to'] })}
            />
            <Field
              label="Covers to"
              type="date"
              hint="the last day it pays for"
              error={errors.to?.message}
              {...register('to', { deps: ['from'] })}
            />
          </div>
          <Field
            label="kWh paid on"
            unit="kWh"
            inputMode="decimal"
            hint="if it says so"
            error={errors.quantityWh?.message}
            {...register('quantityWh')}
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
  );
}
