import { type ReactNode, useState } from 'react';
import { type DefaultValues, type FieldValues, type UseFormReturn, useForm } from 'react-hook-form';
import { type Reading, resolverOf } from '#src/lib/form.ts';
import { showRefusal } from '#src/lib/form-faults.ts';
import { Button } from './button.tsx';
import { Dialog } from './dialog.tsx';
import { ErrorSummary } from './field.tsx';

/**
 * A dialog with a form whose fields are texts, read as a body only when all of them can be. A refusal of the server goes to its field or above the
 * form, and what was typed stays.
 */
export function SaveDialog<V extends FieldValues, B>({
  title,
  hint,
  defaults,
  read,
  save,
  onClose,
  foot,
  children,
}: {
  title: string;
  hint?: ReactNode;
  defaults: DefaultValues<V>;
  /** Must keep its identity: the form validates with it. */
  read: (values: V) => Reading<B>;
  /** Rejects with the server's refusal. */
  save: (body: B) => Promise<unknown>;
  onClose: () => void;
  /** Beside the button. */
  foot?: ReactNode;
  children: (form: UseFormReturn<V>) => ReactNode;
}) {
  const [refused, setRefused] = useState<string[]>([]);
  const form = useForm<V>({ defaultValues: defaults, resolver: resolverOf(read), mode: 'onTouched' });
  const submit = form.handleSubmit(async (values) => {
    const reading = read(values);
    if (!reading.ok) return;
    setRefused([]);
    try {
      await save(reading.body);
      onClose();
    } catch (error) {
      const isField = (field: string) => (field.split('.')[0] ?? field) in form.getValues();
      setRefused(showRefusal<V>(error, form.setError, isField));
    }
  });
  return (
    <Dialog title={title} onClose={onClose}>
      {hint && <p className="hint">{hint}</p>}
      <ErrorSummary errors={refused.map((text) => ({ text }))} title="Not saved" />
      <form noValidate onSubmit={submit}>
        {children(form)}
        <p className="mt-6 flex flex-wrap items-center gap-5">
          <Button type="submit" busy={form.formState.isSubmitting}>
            Save
          </Button>
          {foot}
        </p>
      </form>
    </Dialog>
  );
}
