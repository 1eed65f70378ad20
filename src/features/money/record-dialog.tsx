import { type ReactNode, useState } from 'react';
import { type DefaultValues, type FieldValues, type UseFormReturn, useForm } from 'react-hook-form';
import { type Reading, resolverOf } from '#src/lib/form.ts';
import { showRefusal } from '#src/lib/form-faults.ts';
import { Button } from '#src/ui/button.tsx';
import { Dialog } from '#src/ui/dialog.tsx';
import { ErrorSummary } from '#src/ui/field.tsx';
import { type MoneyChange, useMoneyChange } from './money-queries.ts';

/** A dialog that records one thing: its fields are texts, read as a body only when all of them can be. */
export function RecordDialog<V extends FieldValues, B>({
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
  change: (body: B) => MoneyChange;
  onClose: () => void;
  children: (form: UseFormReturn<V>) => ReactNode;
}) {
  const save = useMoneyChange(householdId);
  const [refused, setRefused] = useState<string[]>([]);
  const form = useForm<V>({ defaultValues: defaults, resolver: resolverOf(read), mode: 'onTouched' });
  const submit = form.handleSubmit((values) => {
    const reading = read(values);
    if (!reading.ok) return;
    setRefused([]);
    save.mutate(change(reading.body), {
      onSuccess: onClose,
      onError: (error) => setRefused(showRefusal<V>(error, form.setError, (field) => field in form.getValues())),
    });
  });
  return (
    <Dialog title={title} onClose={onClose}>
      {hint && <p className="hint">{hint}</p>}
      <ErrorSummary errors={refused.map((text) => ({ text }))} title="Not recorded" />
      <form noValidate onSubmit={submit}>
        {children(form)}
        <p className="mt-6">
          <Button type="submit" busy={save.isPending}>
            Record
          </Button>
        </p>
      </form>
    </Dialog>
  );
}
