import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { type FormEvent, useState } from 'react';
import { useFieldArray, useForm } from 'react-hook-form';
import type { StatementBody } from '#shared/api/cycles.ts';
import type { SetupView } from '#shared/api/setup.ts';
import { showRefusal } from '#src/lib/form-faults.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary, Field } from '#src/ui/field.tsx';
import { PageSkeleton } from '#src/ui/states.tsx';
import { lastStatementQuery, statedQuery } from './log-queries.ts';
import { emptyStatementForm } from './next-statement.ts';
import {
  emptyLine,
  formOfStatement,
  isUntouched,
  type StatementFormValues,
  statementForm,
  statementOfForm,
} from './statement-form-values.ts';
import { LineRows } from './statement-lines.tsx';
import { ReadFields, Sum } from './statement-parts.tsx';

type Props = {
  /** The statement to change; null to type a new one. */
  statement: StatementBody | null;
  save: string;
  busy: boolean;
  onSave: (statement: StatementBody, refuse: (error: unknown) => void) => void;
  onCancel: () => void;
};

/** A statement as a form: dates, reads, lines, banks, balance. A new one is laid out from the rate plan and the meters. */
export function StatementForm(props: Props) {
  const { id } = useHousehold();
  const stated = useQuery({ ...statedQuery(id), enabled: props.statement === null });
  const last = useQuery({ ...lastStatementQuery(id), enabled: props.statement === null });
  if (props.statement === null && (stated.isPending || last.isPending)) return <PageSkeleton />;
  return <Loaded {...props} stated={stated.data ?? null} last={last.data ?? null} />;
}

/** What a new statement is laid out from. */
type Before = { stated: SetupView | null; last: StatementBody | null };

function Loaded({ statement, save, busy, onSave, onCancel, stated, last }: Props & Before) {
  const [refusals, setRefusals] = useState<string[]>([]);
  const [tries, setTries] = useState(0);
  const form = useForm<StatementFormValues, unknown, StatementFormValues>({
    resolver: zodResolver(statementForm),
    mode: 'onTouched',
    defaultValues: statement ? formOfStatement(statement) : emptyStatementForm(stated, last),
  });
  const reads = useFieldArray({ control: form.control, name: 'reads' });
  const lines = useFieldArray({ control: form.control, name: 'lines' });
  const banks = useFieldArray({ control: form.control, name: 'banks' });
  const { errors } = form.formState;
  const submit = (event: FormEvent) => {
    event.preventDefault();
    // A line of the plan that this statement does not print is left out rather than asked for.
    const untouched = form.getValues('lines').flatMap((line, index) => (isUntouched(line) ? [index] : []));
    if (untouched.length > 0) lines.remove(untouched);
    const unread = form.getValues('reads').flatMap((read, index) => (read.current.trim() === '' ? [index] : []));
    if (unread.length > 0) reads.remove(unread);
    void form.handleSubmit(
      (values) => {
        setRefusals([]);
        onSave(statementOfForm(values, statement), (error) =>
          setRefusals(showRefusal(error, form.setError, () => false)),
        );
      },
      () => setTries((before) => before + 1),
    )(event);
  };
  const wrong = tries > 0 && Object.keys(errors).length > 0;
  return (
    <form onSubmit={submit} noValidate className="max-w-[860px]">
      <ErrorSummary
        title="Not taken in yet"
        errors={[
          ...refusals.map((text) => ({ text })),
          ...(wrong ? [{ text: 'Some fields need another look; they are marked below.' }] : []),
        ]}
      />
      <section className="sheet">
        <h2>Dates</h2>
        <div className="grid items-end gap-x-6 sm:grid-cols-3">
          <Field
            label="Service from"
            hint="The earlier read."
            type="date"
            error={errors.from?.message}
            {...form.register('from')}
          />
          <Field label="Service to" hint="This read." type="date" error={errors.to?.message} {...form.register('to')} />
          <Field label="Days, if printed" inputMode="numeric" error={errors.days?.message} {...form.register('days')} />
          <Field
            label="Statement date"
            type="date"
            error={errors.statementOn?.message}
            {...form.register('statementOn')}
          />
          <Field label="Due on" type="date" error={errors.dueOn?.message} {...form.register('dueOn')} />
        </div>
      </section>
      <section className="sheet">
        <h2>Meter reads</h2>
        <p className="hint">
          With previous and current read the kWh follow from the meter. Without them, type the kWh alone; a read without
          a current figure is not taken in.
        </p>
        {reads.fields.map((row, index) => (
          <ReadFields key={row.id} form={form} index={index} onRemove={() => reads.remove(index)} />
        ))}
        <p className="mt-3">
          <Button
            look="plain"
            onClick={() =>
              reads.append({
                meter: '',
                channel: 'import',
                from: '',
                to: '',
                previous: '',
                current: '',
                dials: '5',
                multiplier: '1',
                type: 'actual',
              })
            }
          >
            Add a read
          </Button>
        </p>
        <div className="grid items-end gap-x-6 sm:grid-cols-3">
          <Field
            label="Bought, as printed"
            inputMode="decimal"
            unit="kWh"
            className="input-number"
            error={errors.importKwh?.message}
            {...form.register('importKwh')}
          />
          <Field
            label="Sent out, as printed"
            inputMode="decimal"
            unit="kWh"
            className="input-number"
            error={errors.exportKwh?.message}
            {...form.register('exportKwh')}
          />
          <Field
            label="Made, if printed"
            inputMode="decimal"
            unit="kWh"
            className="input-number"
            error={errors.productionKwh?.message}
            {...form.register('productionKwh')}
          />
        </div>
      </section>
      <section className="sheet">
        <h2>Lines</h2>
        <p className="hint">
          As printed; a credit with a minus or CR. Untick what is printed but not in the amount due, such as credit put
          into the bank. A line left without an amount is not taken in.
        </p>
        <LineRows form={form} fields={lines.fields} onRemove={(index) => lines.remove(index)} />
        <p className="mt-3">
          <Button look="plain" onClick={() => lines.append(emptyLine())}>
            Add a line
          </Button>
        </p>
      </section>
      {banks.fields.length > 0 && (
        <section className="sheet">
          <h2>Credit bank</h2>
          {banks.fields.map((row, index) => (
            <div key={row.id} className="grid items-end gap-x-6 sm:grid-cols-3">
              <p className="pt-4 font-semibold">{row.label}</p>
              <Field
                label="Brought in"
                inputMode="decimal"
                unit={row.unit === 'USD' ? '$' : row.unit}
                error={errors.banks?.[index]?.open?.message}
                {...form.register(`banks.${index}.open`)}
              />
              <Field
                label="Carried on"
                inputMode="decimal"
                unit={row.unit === 'USD' ? '$' : row.unit}
                error={errors.banks?.[index]?.close?.message}
                {...form.register(`banks.${index}.close`)}
              />
            </div>
          ))}
        </section>
      )}
      <section className="sheet">
        <h2>Balance</h2>
        <div className="grid items-end gap-x-6 sm:grid-cols-3">
          <Field
            label="Previous balance"
            inputMode="text"
            unit="$"
            className="input-number"
            error={errors.previousBalance?.message}
            {...form.register('previousBalance')}
          />
          <Field
            label="Payments, with a minus"
            inputMode="text"
            unit="$"
            className="input-number"
            error={errors.payments?.message}
            {...form.register('payments')}
          />
          <Field
            label="Amount due"
            inputMode="text"
            unit="$"
            className="input-number"
            error={errors.due?.message}
            {...form.register('due')}
          />
        </div>
        <Sum form={form} />
      </section>
      <p className="mt-6 flex flex-wrap items-center gap-5">
        <Button type="submit" busy={busy}>
          {save}
        </Button>
        <button type="button" className="link min-h-11" onClick={onCancel}>
          Back without it
        </button>
      </p>
    </form>
  );
}
