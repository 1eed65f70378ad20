import type { CreditCost } from '#shared/facts/finance.ts';
import { Field } from '#src/ui/field.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import { type CreditCostBody, usePutCost } from './credit-queries.ts';
import { type CostValues, costValues, readCost } from './credit-values.ts';
import { CreditPaperField } from './paper-field.tsx';

/** One cost: its own day of completion where it has one, and the paper behind it. The rest is entered in the set-up. */
export function CostDialog({
  cost,
  householdId,
  onClose,
}: {
  cost: CreditCost;
  householdId: string;
  onClose: () => void;
}) {
  const put = usePutCost(householdId);
  return (
    <SaveDialog<CostValues, CreditCostBody>
      title={cost.label}
      hint="Amount and wording are changed in the set-up."
      defaults={costValues(cost)}
      read={readCost}
      save={(body) => put.mutateAsync({ id: cost.id, body })}
      onClose={onClose}
    >
      {({ register, watch, setValue, formState: { errors } }) => (
        <>
          <Field
            label="Completed on a day of its own"
            hint="Leave empty where it was completed with the roof. A part completed in another year enters that year’s form at that year’s rate; after 2025 there is none."
            type="date"
            error={errors.placedInServiceOn?.message}
            {...register('placedInServiceOn')}
          />
          <CreditPaperField
            householdId={householdId}
            kind="invoice"
            value={watch('documentId')}
            error={errors.documentId?.message}
            onChange={(id) => setValue('documentId', id, { shouldDirty: true })}
          />
        </>
      )}
    </SaveDialog>
  );
}
