import { type CostFacts, type CostKind, costKind, INCOME_KINDS } from '#shared/facts/house.ts';
import { Field, SelectField } from '#src/ui/field.tsx';
import { type CostValues, costValues, readCost } from './costs-values.ts';
import { COST_KINDS } from './money-words.ts';
import { OtherDialog } from './other-dialog.tsx';
import type { CostBody } from './other-queries.ts';
import { PaperField } from './paper-field.tsx';

/** What a kind is for, where its name alone does not say it. */
const KIND_HINTS: Partial<Record<CostKind, string>> = {
  depositLost: 'Paid to an installer who never finished. It counts like any other cost.',
  insurance: 'Only what the roof added to the premium.',
  propertyTax: 'Only what the roof added to the tax.',
  rebate: 'Before income tax. One that lowers the cost for the tax credit is entered there as well.',
  stateCredit: 'Before income tax. The federal credit has a screen of its own.',
  srec: 'Before income tax.',
  patronage: 'Before income tax.',
  otherIncome: 'Before income tax.',
};

/** Records a cost or an income, or changes one. */
export function CostDialog({
  cost,
  householdId,
  today,
  onClose,
}: {
  /** Null records a new one. */
  cost: CostFacts | null;
  householdId: string;
  today: string;
  onClose: () => void;
}) {
  return (
    <OtherDialog<CostValues, CostBody>
      title={cost === null ? 'Record a cost or an income' : cost.label}
      hint="The kind says which way the money went."
      householdId={householdId}
      defaults={costValues(cost, today)}
      read={readCost}
      change={(body) => (cost === null ? { kind: 'addCost', body } : { kind: 'changeCost', id: cost.id, body })}
      onClose={onClose}
    >
      {({ register, watch, setValue, formState: { errors } }) => {
        const [kind, every, documentId] = watch(['kind', 'every', 'documentId']);
        return (
          <>
            <SelectField label="Kind" hint={KIND_HINTS[kind]} error={errors.kind?.message} {...register('kind')}>
              <optgroup label="Money paid">
                {costKind.options
                  .filter((one) => !INCOME_KINDS.includes(one))
                  .map((one) => (
                    <option key={one} value={one}>
                      {COST_KINDS[one]}
                    </option>
                  ))}
              </optgroup>
              <optgroup label="Money received">
                {INCOME_KINDS.map((one) => (
                  <option key={one} value={one}>
                    {COST_KINDS[one]}
                  </option>
                ))}
              </optgroup>
            </SelectField>
            <Field label="What" maxLength={160} error={errors.label?.message} {...register('label')} />
            <Field
              label="Amount"
              unit="$"
              inputMode="decimal"
              error={errors.amountCents?.message}
              {...register('amountCents')}
            />
            <SelectField label="How often" error={errors.every?.message} {...register('every')}>
              <option value="once">once</option>
              <option value="month">every month</option>
              <option value="quarter">every quarter</option>
              <option value="year">every year</option>
            </SelectField>
            <Field
              label={every === 'once' ? 'Date' : 'First date'}
              type="date"
              error={errors.on?.message}
              {...register('on')}
            />
            {every !== 'once' && (
              <Field
                label="Last date"
                hint="Leave empty while it goes on; the projection then counts it to its end."
                type="date"
                error={errors.until?.message}
                {...register('until')}
              />
            )}
            <PaperField
              householdId={householdId}
              value={documentId}
              error={errors.documentId?.message}
              onChange={(id) => setValue('documentId', id, { shouldDirty: true })}
            />
          </>
        );
      }}
    </OtherDialog>
  );
}
