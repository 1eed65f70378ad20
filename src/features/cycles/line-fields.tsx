import { type UseFormReturn, useFieldArray } from 'react-hook-form';
import { lineKind } from '#shared/settlement/settlement.ts';
import { Button } from '#src/ui/button.tsx';
import { Field, SelectField } from '#src/ui/field.tsx';
import { Group, Remove, Row } from './form-parts.tsx';
import type { StatementValues } from './statement-values.ts';

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

/** The printed lines of a statement. */
export function LineFields({ form }: { form: UseFormReturn<StatementValues> }) {
  const { register, control, formState } = form;
  const { errors } = formState;
  const lines = useFieldArray({ control, name: 'lines' });
  return (
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
  );
}
