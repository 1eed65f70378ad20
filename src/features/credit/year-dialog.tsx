import type { CreditYear } from '#shared/facts/finance.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Field, SelectField } from '#src/ui/field.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import { type CreditYearBody, usePutYear, useRemoveYear } from './credit-queries.ts';
import { readYear, type YearValues, yearValues } from './credit-values.ts';
import { CreditPaperField } from './paper-field.tsx';

/** One tax year: its limit as the return's worksheet has it, where that was taken from, and what became of the return. */
export function YearDialog({
  year,
  suggested,
  householdId,
  onClose,
}: {
  /** The year to change; null adds one. */
  year: CreditYear | null;
  suggested: number;
  householdId: string;
  onClose: () => void;
}) {
  const put = usePutYear(householdId);
  const remove = useRemoveYear(householdId);
  return (
    <SaveDialog<YearValues, { taxYear: number; body: CreditYearBody }>
      title={year ? `Tax year ${year.taxYear}` : 'Add a tax year'}
      defaults={yearValues(year, suggested)}
      read={readYear}
      save={(reading) => put.mutateAsync(reading)}
      onClose={onClose}
      foot={
        year && (
          <>
            <Button
              look="link"
              busy={remove.isPending}
              onClick={() => remove.mutate(year.taxYear, { onSuccess: onClose })}
            >
              Remove this year
            </Button>
            {remove.isError && <span className="neg">{errorWords(remove.error)}</span>}
          </>
        )
      }
    >
      {({ register, watch, setValue, formState: { errors } }) => {
        const [status, asRefund, documentId] = watch(['status', 'asRefund', 'documentId']);
        return (
          <>
            {!year && (
              <Field label="Tax year" inputMode="numeric" error={errors.taxYear?.message} {...register('taxYear')} />
            )}
            <SelectField label="The return" error={errors.status?.message} {...register('status')}>
              <option value="planned">planned, not filed</option>
              <option value="filed">filed</option>
              <option value="amended">amended</option>
            </SelectField>
            <Field
              label="Limit, line 14"
              hint={
                status === 'planned'
                  ? 'Before the return exists: what you or your preparer expects. Shown as a plan. Leave it empty if you cannot say.'
                  : 'From the worksheet of the return. It is copied, never guessed.'
              }
              unit="$"
              inputMode="decimal"
              error={errors.limitCents?.message}
              {...register('limitCents')}
            />
            <Field
              label="Taken from"
              hint="Which worksheet of which return, such as: line 14 worksheet, 2025 return."
              maxLength={160}
              error={errors.limitFrom?.message}
              {...register('limitFrom')}
            />
            {status !== 'planned' && (
              <>
                <Field label="Filed on" type="date" error={errors.filedOn?.message} {...register('filedOn')} />
                <SelectField
                  label="How the money comes"
                  hint="A refund counts on the day it came; less tax due counts on the day of filing."
                  {...register('asRefund')}
                >
                  <option value="refund">in a refund</option>
                  <option value="lessTax">as less tax due</option>
                </SelectField>
                {asRefund === 'refund' && (
                  <Field
                    label="Refund came on"
                    hint="Leave empty while it is awaited."
                    type="date"
                    error={errors.refundOn?.message}
                    {...register('refundOn')}
                  />
                )}
              </>
            )}
            <CreditPaperField
              householdId={householdId}
              kind="return"
              value={documentId}
              error={errors.documentId?.message}
              onChange={(id) => setValue('documentId', id, { shouldDirty: true })}
            />
          </>
        );
      }}
    </SaveDialog>
  );
}
