import { zodResolver } from '@hookform/resolvers/zod';
import { type ReactNode, useState } from 'react';
import { useForm } from 'react-hook-form';
import type { StatementBody } from '#shared/api/cycles.ts';
import { refusalLines } from '#src/lib/form.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary, Field, TextArea } from '#src/ui/field.tsx';
import { BalanceFields, BankFields } from './balance-fields.tsx';
import { type Form, Three } from './fields-row.tsx';
import { LineFields } from './line-fields.tsx';
import { ReadFields } from './read-fields.tsx';
import { messagesOf } from './statement-messages.ts';
import { statementOfForm } from './statement-of-form.ts';
import { correctionForm, type StatementFormValues, statementForm } from './statement-values.ts';

/** A statement as a form: dates, reads, lines, banks, balance; a posted one is corrected with a reason. */
export function StatementForm({
  defaults,
  correction = false,
  head,
  save,
  busy,
  refusal,
  onSave,
  onCancel,
}: {
  /** The values to begin with; later ones are not looked at. */
  defaults: StatementFormValues;
  /** True for a posted statement: asks why. */
  correction?: boolean;
  head?: ReactNode;
  save: string;
  busy: boolean;
  /** Why the server refused what was saved; null while it has not. */
  refusal: unknown;
  onSave: (statement: StatementBody, reason: string) => void;
  onCancel: () => void;
}) {
  const [tries, setTries] = useState(0);
  const form = useForm<StatementFormValues, unknown, StatementFormValues>({
    resolver: zodResolver(correction ? correctionForm : statementForm),
    mode: 'onTouched',
    // The summary above takes the focus; its lines lead to the fields.
    shouldFocusError: false,
    defaultValues: defaults,
  });
  const { errors } = form.formState;
  const submit = form.handleSubmit(
    (values) => {
      setTries(0);
      onSave(statementOfForm(values), values.reason.trim());
    },
    () => setTries((before) => before + 1),
  );
  const wrong = tries === 0 ? [] : messagesOf(errors);
  return (
    <form onSubmit={submit} noValidate className="max-w-[920px]">
      {head}
      <ErrorSummary
        key={tries}
        title={correction ? 'Not saved yet' : 'Not taken in yet'}
        errors={[
          ...(refusal === null ? [] : refusalLines(refusal)),
          ...wrong.map(({ text, path }) => ({ text, pick: () => form.setFocus(path) })),
        ]}
      />
      <DateFields form={form} />
      <ReadFields form={form} />
      <LineFields form={form} />
      <BankFields form={form} />
      <BalanceFields form={form} />
      {correction && (
        <TextArea
          label="Reason"
          hint="What was wrong with the values as they stand."
          rows={2}
          maxLength={500}
          error={errors.reason?.message}
          {...form.register('reason')}
        />
      )}
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

function DateFields({ form }: { form: Form }) {
  const { errors } = form.formState;
  return (
    <section className="sheet">
      <h2>Dates</h2>
      <Three>
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
      </Three>
    </section>
  );
}
