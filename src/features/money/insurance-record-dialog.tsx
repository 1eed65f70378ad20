import type { MortgageFacts } from '#shared/facts/finance.ts';
import { Field, SelectField } from '#src/ui/field.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import { type RecordBody, useMortgageChange } from './insurance-queries.ts';
import { type RecordValues, readRecord, recordValues } from './insurance-values.ts';

/** How the home is used, whether payments were late, whether another lien is there, and when the removal was asked for. */
export function InsuranceRecordDialog({
  facts,
  householdId,
  onClose,
}: {
  facts: MortgageFacts;
  householdId: string;
  onClose: () => void;
}) {
  const change = useMortgageChange(householdId);
  return (
    <SaveDialog<RecordValues, RecordBody>
      title="What the request rests on"
      defaults={recordValues(facts)}
      read={readRecord}
      save={(body) => change.mutateAsync({ kind: 'putRecord', body })}
      onClose={onClose}
    >
      {({ register, watch, formState: { errors } }) => (
        <>
          <SelectField label="Late payments" error={errors.late?.message} {...register('late')}>
            <option value="unknown">not stated</option>
            <option value="none">none late in the last two years</option>
            <option value="some">some were late</option>
          </SelectField>
          {watch('late') === 'some' && (
            <>
              <Field
                label="30 days late or more"
                hint="in the last 12 months"
                inputMode="numeric"
                error={errors.thirtyIn12?.message}
                {...register('thirtyIn12')}
              />
              <Field
                label="60 days late or more"
                hint="in the last 24 months"
                inputMode="numeric"
                error={errors.sixtyIn24?.message}
                {...register('sixtyIn24')}
              />
            </>
          )}
          <SelectField
            label="Another lien on the home"
            hint="A home-equity loan, a second mortgage, a judgment. The solar loan’s own security is entered with the loan."
            error={errors.otherLien?.message}
            {...register('otherLien')}
          >
            <option value="unknown">not stated</option>
            <option value="no">no</option>
            <option value="yes">yes</option>
          </SelectField>
          <SelectField label="Units" error={errors.units?.message} {...register('units')}>
            <option value="1">one</option>
            <option value="2">two</option>
            <option value="3">three</option>
            <option value="4">four</option>
          </SelectField>
          <SelectField label="The home is" error={errors.occupancy?.message} {...register('occupancy')}>
            <option value="principal">where you live</option>
            <option value="second">a second home</option>
            <option value="investment">let to others</option>
          </SelectField>
          <Field
            label="Asked for in writing on"
            hint="Leave empty until the letter is sent."
            type="date"
            error={errors.requestedOn?.message}
            {...register('requestedOn')}
          />
        </>
      )}
    </SaveDialog>
  );
}
