import { type ReactNode, useState } from 'react';
import { type DefaultValues, type FieldValues, type UseFormReturn, useForm } from 'react-hook-form';
import { type Reading, resolverOf } from '#src/lib/form.ts';
import { showRefusal } from '#src/lib/form-faults.ts';
import { Button } from '#src/ui/button.tsx';
import { Dialog } from '#src/ui/dialog.tsx';
import { ErrorSummary } from '#src/ui/field.tsx';
import { type OtherChange, useOtherChange } from './other-queries.ts';

/**
 * A dialog that records or changes one thing of costs, other loans or the lease. Its fields are texts, read as a body only when all of them can
 * be; a refusal of the server goes to its field, and what was typed stays.
 */
export function OtherDialog<V extends FieldValues, B>({
  title,
  hint,
  householdId,
  defaults,
  read,
  change,
  onClose,
  children,
}: {
  title: string;
  hint?: ReactNode;
  householdId: string;
  defaults: DefaultValues<V>;
  /** Must keep its identity: the form validates with it. */
  read: (values: V) => Reading<B>;
  change: (body: B) => OtherChange;
  onClose: () => void;
  children: (form: UseFormReturn<V>) => ReactNode;
}) {
  const save = useOtherChange(householdId);
  const [refused, setRefused] = useState<string[]>([]);
  const form = useForm<V>({ defaultValues: defaults, resolver: resolverOf(read), mode: 'onTouched' });
  const submit = form.handleSubmit((values) => {
    const reading = read(values);
    if (!reading.ok) return;
    setRefused([]);
    save.mutate(change(reading.body), {
      onSuccess: onClose,
      onError: (error) => setRefused(showRefusal(error, form.setError, (field) => field in values)),
    });
  });
  return (
    <Dialog title={title} onClose={onClose}>
      {hint && <p className="hint">{hint}</p>}
      <ErrorSummary errors={refused.map((text) => ({ text }))} title="Not saved" />
      <form noValidate onSubmit={submit}>
        {children(form)}
        <p className="mt-6">
          <Button type="submit" busy={save.isPending}>
            Save
          </Button>
        </p>
      </form>
    </Dialog>
  );
}
