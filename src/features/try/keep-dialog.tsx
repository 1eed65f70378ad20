import { useCallback } from 'react';
import type { Levers, Scenario } from '#shared/facts/scenario.ts';
import { FaultList, type Reading } from '#src/lib/form.ts';
import { Field } from '#src/ui/field.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import { Tick, Ticks } from '#src/ui/ticks.tsx';
import { useKeep } from './try-queries.ts';

type Values = { name: string; inPlace: boolean };
type Kept = { id: string; name: string };

/** Keeps the levers as they stand under a name, or in the place of the kept change that was opened. */
export function KeepDialog({
  householdId,
  levers,
  scenarios,
  opened,
  onKept,
  onClose,
}: {
  householdId: string;
  levers: Levers;
  scenarios: readonly Scenario[];
  opened: Scenario | null;
  onKept: (id: string) => void;
  onClose: () => void;
}) {
  const keep = useKeep(householdId);
  const read = useCallback((values: Values): Reading<Kept> => readKept(values, scenarios, opened), [scenarios, opened]);
  return (
    <SaveDialog<Values, Kept>
      title="Keep this change"
      hint="Only the levers are kept. What they come to is worked out anew each time."
      defaults={{ name: opened?.name ?? '', inPlace: opened !== null }}
      read={read}
      save={async ({ id, name }) => {
        await keep.mutateAsync({ id, name, levers });
        onKept(id);
      }}
      onClose={onClose}
    >
      {({ register, watch, setValue, formState: { errors } }) => (
        <>
          <Field label="Name" maxLength={60} error={errors.name?.message} {...register('name')} />
          {opened && (
            <Ticks>
              <Tick
                label={`In the place of “${opened.name}”`}
                checked={watch('inPlace')}
                onChange={(on) => setValue('inPlace', on, { shouldValidate: true })}
              />
            </Ticks>
          )}
        </>
      )}
    </SaveDialog>
  );
}

/** The id and name to keep under; names are told apart without regard to case, as on the server. */
export function readKept(
  { name, inPlace }: Values,
  scenarios: readonly Pick<Scenario, 'id' | 'name'>[],
  opened: Pick<Scenario, 'id'> | null,
): Reading<Kept> {
  const list = new FaultList();
  const id = inPlace && opened ? opened.id : crypto.randomUUID();
  const said = name.trim();
  if (said === '') list.add('name', 'Give it a name.');
  if (scenarios.some((one) => one.id !== id && one.name.toLowerCase() === said.toLowerCase())) {
    list.add('name', 'Another change has this name. Choose a different one.');
  }
  return list.reading({ id, name: said });
}
