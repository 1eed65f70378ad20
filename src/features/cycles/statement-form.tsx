import { type ReactNode, useState } from 'react';
import { type FieldErrors, useFieldArray, useForm } from 'react-hook-form';
import type { Statement } from '#shared/facts/papers.ts';
import { lineKind } from '#shared/settlement/settlement.ts';
import { refusalLines, resolverOf } from '#src/lib/form.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary, Field, SelectField, TextArea } from '#src/ui/field.tsx';
import { useCorrect } from './cycles-queries.ts';
import { readStatementValues, type StatementValues, valuesOf } from './statement-values.ts';

const resolver = resolverOf(readStatementValues);

const KIND_WORDS: Record<string, string> = {
  import: 'import',
  export: 'export',
  credit: 'credit',
  incentive: 'incentive',
  fixed: 'fixed charge',
  nonbypassable: 'charge on import',
  demand: 'demand',
  tax: 'tax',
  minimum: 'minimum bill',
  trueup: 'true-up',
  adjustment: 'adjustment',
  previousBalance: 'previous balance',
  payment: 'payment',
  otherService: 'other service',
};

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
  const lines = useFieldArray({ control, name: 'lines' });
  const reads = useFieldArray({ control, name: 'reads' });
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
      <Group title="Register reads">
        {reads.fields.map((read, index) => (
          <fieldset key={read.id} className="border-b border-rule pb-3">
            <legend className="visually-hidden">Read {index + 1}</legend>
            <Row>
              <Field label="Meter" {...register(`reads.${index}.meter`)} />
              <SelectField label="Channel" {...register(`reads.${index}.channel`)}>
                <option value="import">import</option>
                <option value="export">export</option>
                <option value="production">production</option>
              </SelectField>
              <Field
                label="Previous"
                inputMode="decimal"
                error={errors.reads?.[index]?.previous?.message}
                {...register(`reads.${index}.previous`)}
              />
              <Field
                label="Current"
                inputMode="decimal"
                error={errors.reads?.[index]?.current?.message}
                {...register(`reads.${index}.current`)}
              />
              <SelectField label="Read type" {...register(`reads.${index}.type`)}>
                <option value="actual">actual</option>
                <option value="estimated">estimated</option>
              </SelectField>
              <Field
                label="From"
                type="date"
                error={errors.reads?.[index]?.from?.message}
                {...register(`reads.${index}.from`)}
              />
              <Field
                label="To"
                type="date"
                error={errors.reads?.[index]?.to?.message}
                {...register(`reads.${index}.to`)}
              />
              <Field
                label="Dials"
                inputMode="numeric"
                error={errors.reads?.[index]?.dials?.message}
                {...register(`reads.${index}.dials`)}
              />
              <Field
                label="Multiplier"
                inputMode="decimal"
                error={errors.reads?.[index]?.multiplier?.message}
                {...register(`reads.${index}.multiplier`)}
              />
            </Row>
            <Remove what={`read ${index + 1}`} onClick={() => reads.remove(index)} />
          </fieldset>
        ))}
        <Button
          look="link"
          onClick={() =>
            reads.append({
              meter: reads.fields[0]?.meter ?? '',
              channel: 'import',
              from: form.getValues('from'),
              to: form.getValues('to'),
              previous: '',
              current: '',
              dials: reads.fields[0]?.dials ?? '5',
              multiplier: '1',
              type: 'actual',
              row: null,
            })
          }
        >
          Add a read
        </Button>
      </Group>
      <Group title="Lines">
        {lines.fields.map((line, index) => (
          <fieldset key={line.id} className="border-b border-rule pb-3">
            <legend className="visually-hidden">Line {index + 1}</legend>
            <Row>
              <Field
                label="As printed"
                error={errors.lines?.[index]?.label?.message}
                {...register(`lines.${index}.label`)}
              />
              <SelectField label="Kind" {...register(`lines.${index}.kind`)}>
                {[...lineKind.options, 'otherService'].map((kind) => (
                  <option key={kind} value={kind}>
                    {KIND_WORDS[kind] ?? kind}
                  </option>
                ))}
              </SelectField>
              <Field
                label="Quantity"
                inputMode="decimal"
                error={errors.lines?.[index]?.quantity?.message}
                {...register(`lines.${index}.quantity`)}
              />
              <SelectField label="Unit" {...register(`lines.${index}.unit`)}>
                <option value="">none</option>
                <option value="kWh">kWh</option>
                <option value="kW">kW</option>
                <option value="day">days</option>
                <option value="cycle">cycle</option>
                <option value="USD">$</option>
              </SelectField>
              <Field
                label="Rate"
                inputMode="decimal"
                error={errors.lines?.[index]?.rate?.message}
                {...register(`lines.${index}.rate`)}
              />
              <Field
                label="Amount, $"
                hint="credits negative"
                error={errors.lines?.[index]?.amountCents?.message}
                {...register(`lines.${index}.amountCents`)}
              />
            </Row>
            <p className="flex flex-wrap items-center gap-x-6">
              <label className="flex min-h-11 items-center gap-3">
                <input type="checkbox" className="size-5 accent-accent" {...register(`lines.${index}.inDue`)} />
                part of the amount due
              </label>
              <Remove what={`line ${index + 1}`} onClick={() => lines.remove(index)} />
            </p>
          </fieldset>
        ))}
        <Button
          look="link"
          onClick={() =>
            lines.append({
              label: '',
              kind: 'fixed',
              component: null,
              quantity: '',
              unit: '',
              rate: '',
              amountCents: '',
              inDue: true,
              row: null,
            })
          }
        >
          Add a line
        </Button>
      </Group>
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

function Row({ children }: { children: ReactNode }) {
  return (
    <div className="grid items-end gap-x-4 [grid-template-columns:repeat(auto-fill,minmax(min(148px,100%),1fr))]">
      {children}
    </div>
  );
}

function Group({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="mt-7">
      <h3 className="border-b-2 border-ink pb-1">{title}</h3>
      {children}
    </section>
  );
}

function Remove({ what, onClick }: { what: string; onClick: () => void }) {
  return (
    <button type="button" className="link min-h-11 text-[15px]" onClick={onClick} aria-label={`Remove ${what}`}>
      Remove
    </button>
  );
}

/** Every message of a tree of errors, once. */
function messagesOf(errors: FieldErrors<StatementValues>): { text: string }[] {
  const found = new Map<string, string>();
  const walk = (node: unknown, path: string[]): void => {
    if (typeof node !== 'object' || node === null) return;
    if ('message' in node && typeof node.message === 'string') {
      found.set(path.join('.'), `${placeOf(path)}: ${node.message}`);
      return;
    }
    for (const [key, value] of Object.entries(node)) if (key !== 'ref') walk(value, [...path, key]);
  };
  walk(errors, []);
  return [...found.values()].map((text) => ({ text }));
}

const FIELD_WORDS: Record<string, string> = {
  from: 'First day',
  to: 'Last day',
  printedDays: 'Days printed',
  statementOn: 'Statement date',
  dueOn: 'Due date',
  importWh: 'Import',
  exportWh: 'Export',
  productionWh: 'Production',
  previousBalanceCents: 'Previous balance',
  paymentsCents: 'Payments',
  amountDueCents: 'Amount due',
  amountCents: 'Amount',
  label: 'As printed',
  reason: 'Reason',
};

function placeOf(path: string[]): string {
  const [head = '', index, field = ''] = path;
  if (index === undefined) return FIELD_WORDS[head] ?? head;
  const what = head === 'lines' ? 'Line' : head === 'reads' ? 'Read' : 'Bank';
  return `${what} ${Number(index) + 1}, ${(FIELD_WORDS[field] ?? field).toLowerCase()}`;
}
