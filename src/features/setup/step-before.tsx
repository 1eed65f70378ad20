import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useFieldArray, useForm } from 'react-hook-form';
import * as z from 'zod/mini';
import { type SetupView, setupApi } from '#shared/api/setup.ts';
import { useHousehold } from '#src/lib/household.ts';
import { fieldValue, textOf, typed } from '#src/lib/typed-values.ts';
import { Button } from '#src/ui/button.tsx';
import { Field, TextArea } from '#src/ui/field.tsx';
import { AddRow, Columns, FormRow, Part } from '#src/ui/rows.tsx';
import { readPastedUse } from './pasted-use.ts';
import { StepForm } from './step-form.tsx';

const beforeForm = z.object({
  rows: z.array(
    z.object({ from: typed.day, to: typed.day, kwh: typed.kwh }).check(
      z.refine((row) => row.from < row.to, {
        error: 'The later read must come after the earlier one.',
        path: ['to'],
      }),
    ),
  ),
});

export function BeforeStep({ view }: { view: SetupView }) {
  const { canEdit } = useHousehold();
  const form = useForm({
    resolver: zodResolver(beforeForm),
    mode: 'onTouched',
    defaultValues: {
      rows: view.usageBefore.map((row) => ({
        from: String(row.from),
        to: String(row.to),
        kwh: textOf.wh(row.importWh),
      })),
    },
  });
  const rows = useFieldArray({ control: form.control, name: 'rows' });
  const last = form.watch('rows').at(-1);
  return (
    <StepForm
      step="before"
      form={form}
      endpoint={setupApi.before}
      toBody={(values) => ({
        usageBefore: values.rows.map((row) => ({
          from: fieldValue.day(row.from),
          to: fieldValue.day(row.to),
          importWh: fieldValue.wh(row.kwh),
        })),
      })}
    >
      {canEdit && <Paste onRows={(pasted) => rows.append(pasted)} />}
      <Part title="Statements from before" hint="Twelve months or more, so that every month of the year has its own.">
        {rows.fields.length === 0 && <p className="mt-3">None yet. Paste a list above, or add them one by one.</p>}
        {rows.fields.map((row, index) => {
          const at = form.formState.errors.rows?.[index];
          return (
            <FormRow key={row.id} title={`Statement ${index + 1}`} onRemove={() => rows.remove(index)}>
              <Columns three>
                <Field label="From" type="date" error={at?.from?.message} {...form.register(`rows.${index}.from`)} />
                <Field label="To" type="date" error={at?.to?.message} {...form.register(`rows.${index}.to`)} />
                <Field
                  label="Used"
                  inputMode="decimal"
                  unit="kWh"
                  className="input-number"
                  error={at?.kwh?.message}
                  {...form.register(`rows.${index}.kwh`)}
                />
              </Columns>
            </FormRow>
          );
        })}
        <AddRow onClick={() => rows.append({ from: last?.to ?? '', to: '', kwh: '' })}>Add a statement</AddRow>
      </Part>
    </StepForm>
  );
}

function Paste({ onRows }: { onRows: (rows: { from: string; to: string; kwh: string }[]) => void }) {
  const [text, setText] = useState('');
  const [said, setSaid] = useState<{ text: string; bad: boolean } | null>(null);
  const take = () => {
    const { rows, faults } = readPastedUse(text);
    onRows(rows);
    setText(faults.map((fault) => fault.line).join('\n'));
    const first = faults[0];
    if (first)
      setSaid({
        bad: true,
        text: `${rows.length} taken. ${faults.length} could not be read and are left here; line ${first.number}: ${first.message}`,
      });
    else
      setSaid({
        bad: false,
        text: rows.length === 0 ? 'There was nothing to take.' : `${rows.length} taken into the list below.`,
      });
  };
  return (
    <>
      <TextArea
        label="Paste from a spreadsheet"
        hint="Three columns: from, to and kWh, one statement to a line. Dates such as 2023-08-14 or 8/14/2023."
        rows={4}
        spellCheck={false}
        value={text}
        onChange={(event) => setText(event.target.value)}
      />
      <p className="mt-2 flex flex-wrap items-center gap-4">
        <Button look="plain" disabled={text.trim() === ''} onClick={take}>
          Take these in
        </Button>
        {said && (
          <span role="status" className={said.bad ? 'field-error' : 'hint'}>
            {said.text}
          </span>
        )}
      </p>
    </>
  );
}
