import { useState } from 'react';
import { useFieldArray, useForm } from 'react-hook-form';
import type { Statement } from '#shared/facts/papers.ts';
import { refusalLines, resolverOf } from '#src/lib/form.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary, Field, TextArea } from '#src/ui/field.tsx';
import { useCorrect } from './cycles-queries.ts';
import { Group, Row } from './form-parts.tsx';
import { LineFields } from './line-fields.tsx';
import { ReadFields } from './read-fields.tsx';
import { messagesOf } from './statement-messages.ts';
import { readStatementValues, type StatementValues, valuesOf } from './statement-values.ts';

const resolver = resolverOf(readStatementValues);

/** Corrects a posted statement: the values as they stand, to be changed, and a reason. The old revision stays readable. */
export default function StatementForm({
  statement,
  householdId,
  cycleTo,
  onCancel,
  onDone,
}: {
  statement: Statement;
  householdId: string;
  cycleTo: string;
  onCancel: () => void;
  onDone: (to: string) => void;
}) {
  const correct = useCorrect(householdId, cycleTo);
  const [tried, setTried] = useState(0);
  const form = useForm<StatementValues>({ defaultValues: valuesOf(statement), resolver, mode: 'onTouched' });
  const { register, control, formState } = form;
  const banks = useFieldArray({ control, name: 'banks' });
  const { errors } = formState;
  const submit = form.handleSubmit(
    (values) => {
      const read = readStatementValues(values);
      if (!read.ok) return;
      correct.mutate(read.body, { onSuccess: (done) => onDone(done.to), onError: () => setTried((n) => n + 1) });
    },
    () => setTried((n) => n + 1),
  );
  const summary = [...(tried > 0 ? messagesOf(errors) : []), ...(correct.isError ? refusalLines(correct.error) : [])];
  return (
    <form noValidate onSubmit={submit} className="sheet" aria-labelledby="correct-title">
      <h2 id="correct-title">Correct the statement</h2>
      <p className="hint">
        Write what the paper says, even where it is wrong. The statement as it stands is kept as revision{' '}
        {statement.revision}.
      </p>
      <ErrorSummary key={tried} errors={summary} />
      <Row>
        <Field label="First day" type="date" error={errors.from?.message} {...register('from')} />
        <Field
          label="Last day"
          hint="the read that ends it"
          type="date"
          error={errors.to?.message}
          {...register('to')}
        />
        <Field
          label="Days printed"
          inputMode="numeric"
          error={errors.printedDays?.message}
          {...register('printedDays')}
        />
        <Field label="Statement date" type="date" error={errors.statementOn?.message} {...register('statementOn')} />
        <Field label="Due date" type="date" error={errors.dueOn?.message} {...register('dueOn')} />
      </Row>
      <Row>
        <Field
          label="Import"
          unit="kWh"
          inputMode="decimal"
          error={errors.importWh?.message}
          {...register('importWh')}
        />
        <Field
          label="Export"
          unit="kWh"
          inputMode="decimal"
          error={errors.exportWh?.message}
          {...register('exportWh')}
        />
        <Field
          label="Production"
          unit="kWh"
          inputMode="decimal"
          error={errors.productionWh?.message}
          {...register('productionWh')}
        />
      </Row>
      <ReadFields form={form} />
      <LineFields form={form} />
      {banks.fields.length > 0 && (
        <Group title="Credit banks">
          {banks.fields.map((bank, index) => (
            <Row key={bank.id}>
              <Field
                label={`Opening, ${bank.unit}`}
                error={errors.banks?.[index]?.open?.message}
                {...register(`banks.${index}.open`)}
              />
              <Field
                label={`Closing, ${bank.unit}`}
                error={errors.banks?.[index]?.close?.message}
                {...register(`banks.${index}.close`)}
              />
            </Row>
          ))}
        </Group>
      )}
      <Row>
        <Field
          label="Previous balance, $"
          error={errors.previousBalanceCents?.message}
          {...register('previousBalanceCents')}
        />
        <Field
          label="Payments, $"
          hint="negative, as on the statement"
          error={errors.paymentsCents?.message}
          {...register('paymentsCents')}
        />
        <Field label="Amount due, $" error={errors.amountDueCents?.message} {...register('amountDueCents')} />
      </Row>
      <TextArea
        label="Reason"
        hint="What was wrong with the values as they stand."
        rows={2}
        maxLength={500}
        error={errors.reason?.message}
        {...register('reason')}
      />
      <p className="mt-6 flex flex-wrap items-center gap-5">
        <Button type="submit" busy={correct.isPending}>
          Save as revision {statement.revision + 1}
        </Button>
        <Button look="link" onClick={onCancel}>
          Cancel
        </Button>
      </p>
    </form>
  );
}
