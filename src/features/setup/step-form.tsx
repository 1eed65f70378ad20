import { type ReactNode, useState } from 'react';
import type { FieldErrors, FieldValues, Path, UseFormReturn } from 'react-hook-form';
import { useNavigate } from 'react-router-dom';
import type { Endpoint } from '#shared/api/endpoint.ts';
import { SETUP_STEPS, type SetupStep, type SetupView } from '#shared/api/setup.ts';
import { showRefusal } from '#src/lib/form-faults.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary } from '#src/ui/field.tsx';
import { useSaveStep, useSkipStep } from './setup-queries.ts';

/**
 * The frame of a set-up step's form: summary of what is wrong, the fields, "Save and go on" and "Skip for now". `toBody` may trust that the
 * form's schema has passed. Those who may not change anything see the fields closed and no buttons.
 */
export function StepForm<T extends FieldValues, B>({
  step,
  form,
  endpoint,
  toBody,
  children,
}: {
  step: SetupStep;
  form: UseFormReturn<T, unknown, T>;
  endpoint: Endpoint<B, SetupView>;
  toBody: (typed: T) => B;
  children: ReactNode;
}) {
  const { id, canEdit } = useHousehold();
  const navigate = useNavigate();
  const save = useSaveStep(id, endpoint);
  const skip = useSkipStep(id);
  const [refusals, setRefusals] = useState<string[]>([]);
  const [wrong, setWrong] = useState<{ path: string; text: string }[]>([]);
  const onward = () => navigate(nextOf(id, step));
  const submit = form.handleSubmit(
    (values) => {
      setRefusals([]);
      setWrong([]);
      save.mutate(toBody(values), {
        onSuccess: onward,
        onError: (error) =>
          setRefusals(showRefusal(error, form.setError, (field) => hasField(form.getValues(), field))),
      });
    },
    (errors) => {
      setRefusals([]);
      setWrong(flatten(errors));
    },
  );
  const summary = [
    ...refusals.map((text) => ({ text })),
    ...wrong.map(({ path, text }) => ({ text, pick: () => focusOn(path, () => form.setFocus(path as Path<T>)) })),
  ];
  return (
    <form onSubmit={submit} noValidate>
      <ErrorSummary title="Not saved yet" errors={summary} />
      <fieldset disabled={!canEdit} className="min-w-0 [&:disabled_button]:hidden">
        {children}
      </fieldset>
      {canEdit && (
        <p className="mt-7 flex flex-wrap items-center gap-x-5 gap-y-3">
          <Button type="submit" busy={save.isPending}>
            Save and go on
          </Button>
          <Button look="plain" busy={skip.isPending} onClick={() => skip.mutate(step, { onSuccess: onward })}>
            Skip for now
          </Button>
        </p>
      )}
    </form>
  );
}

/** Fields the form library does not hold are found by their name. */
function focusOn(path: string, otherwise: () => void): void {
  const field = document.getElementsByName(path)[0];
  if (field) field.focus();
  else otherwise();
}

function nextOf(householdId: string, step: SetupStep): string {
  const next = SETUP_STEPS[SETUP_STEPS.indexOf(step) + 1];
  return next ? `/h/${householdId}/setup/${next}` : `/h/${householdId}/setup`;
}

function hasField(values: unknown, path: string): boolean {
  let at: unknown = values;
  for (const part of path.split('.')) {
    if (typeof at !== 'object' || at === null || !(part in at)) return false;
    at = (at as Record<string, unknown>)[part];
  }
  return typeof at !== 'object';
}

/** Every message of a form's errors with the path of its field, without repeating one sentence. */
function flatten(errors: FieldErrors, at = ''): { path: string; text: string }[] {
  const found: { path: string; text: string }[] = [];
  for (const [name, error] of Object.entries(errors)) {
    if (!error || name === 'ref') continue;
    const path = at === '' ? name : `${at}.${name}`;
    if (typeof error.message === 'string' && error.message !== '') found.push({ path, text: error.message });
    else if (typeof error === 'object') found.push(...flatten(error as FieldErrors, path));
  }
  return found.filter((one, index) => found.findIndex((other) => other.text === one.text) === index);
}
