import { useForm } from 'react-hook-form';
import type { CreditYear } from '#shared/facts/finance.ts';
import { dollarsText, parseDollars } from '#shared/units/cents.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import { FaultList, type Reading, refusalLines, resolverOf } from '#src/lib/form.ts';
import { Button } from '#src/ui/button.tsx';
import { Dialog } from '#src/ui/dialog.tsx';
import { ErrorSummary, Field, SelectField } from '#src/ui/field.tsx';
import { type CreditYearBody, usePutYear, useRemoveYear } from './credit-queries.ts';

type YearValues = {
  taxYear: string;
  limitCents: string;
  status: CreditYear['status'];
  filedOn: string;
  refundOn: string;
  asRefund: 'refund' | 'lessTax';
};

const NO_DATE = 'Write a date that exists.';

function readYear(values: YearValues): Reading<{ taxYear: number; body: CreditYearBody }> {
  const list = new FaultList();
  const taxYear = list.needed(values.taxYear, yearOf, 'taxYear', 'Write a year such as 2026.', 0);
  const filed = values.status !== 'planned';
  const asRefund = values.asRefund === 'refund';
  const body: CreditYearBody = {
    limitCents: list.optional(values.limitCents, parsePositive, 'limitCents', 'Write an amount such as 4150.'),
    status: values.status,
    filedOn: filed ? list.needed(values.filedOn, parseDay, 'filedOn', NO_DATE, '1970-01-01' as Day) : null,
    refundOn: filed && asRefund ? list.optional(values.refundOn, parseDay, 'refundOn', NO_DATE) : null,
    asRefund,
    limitFrom: null,
    documentId: null,
  };
  if (filed && body.limitCents === null) list.add('limitCents', 'A filed return has a line 14; write it here.');
  return list.reading({ taxYear, body });
}

function yearOf(text: string): number | null {
  const year = Number(text.trim());
  return Number.isInteger(year) && year >= 2006 && year <= 2100 ? year : null;
}

function parsePositive(text: string) {
  const amount = parseDollars(text);
  return amount !== null && amount >= 0 ? amount : null;
}

const resolver = resolverOf(readYear);

/** One tax year: its limit as the return's worksheet has it, and what became of the return. */
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
  const form = useForm<YearValues>({
    resolver,
    mode: 'onTouched',
    defaultValues: {
      taxYear: String(year?.taxYear ?? suggested),
      limitCents: year?.limitCents == null ? '' : dollarsText(year.limitCents),
      status: year?.status ?? 'planned',
      filedOn: year?.filedOn ?? '',
      refundOn: year?.refundOn ?? '',
      asRefund: year === null || year.asRefund ? 'refund' : 'lessTax',
    },
  });
  const { register, formState, watch } = form;
  const { errors } = formState;
  const status = watch('status');
  const asRefund = watch('asRefund');
  const submit = form.handleSubmit((values) => {
    const reading = readYear(values);
    if (reading.ok) put.mutate(reading.body, { onSuccess: onClose });
  });
  const error = put.error ?? remove.error;
  return (
    <Dialog title={year ? `Tax year ${year.taxYear}` : 'Add a tax year'} onClose={onClose}>
      <ErrorSummary errors={error ? refusalLines(error) : []} />
      <form noValidate onSubmit={submit}>
        {!year && (
          <Field label="Tax year" inputMode="numeric" error={errors.taxYear?.message} {...register('taxYear')} />
        )}
        <Field
          label="Limit, line 14"
          hint={
            status === 'planned'
              ? 'From the worksheet of the return. Before the return exists: what your preparer expects, or leave it empty.'
              : 'From the worksheet of the return. It is copied, never guessed.'
          }
          unit="$"
          inputMode="decimal"
          error={errors.limitCents?.message}
          {...register('limitCents')}
        />
        <SelectField label="The return" error={errors.status?.message} {...register('status')}>
          <option value="planned">planned, not filed</option>
          <option value="filed">filed</option>
          <option value="amended">amended</option>
        </SelectField>
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
        <p className="mt-6 flex flex-wrap items-center gap-5">
          <Button type="submit" busy={put.isPending}>
            Save
          </Button>
          {year && (
            <Button
              look="link"
              busy={remove.isPending}
              onClick={() => remove.mutate(year.taxYear, { onSuccess: onClose })}
            >
              Remove this year
            </Button>
          )}
        </p>
      </form>
    </Dialog>
  );
}
