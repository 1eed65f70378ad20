import type { ReactNode } from 'react';
import { Button } from './button.tsx';

/** One row of a repeating part of a form, with its number and a way to take it out. */
export function FormRow({
  title,
  onRemove,
  children,
}: {
  title: string;
  onRemove: (() => void) | null;
  children: ReactNode;
}) {
  return (
    <fieldset className="mt-4 min-w-0 border-t border-rule pt-3">
      <legend className="float-left w-full font-semibold">
        <span className="flex items-baseline justify-between gap-4">
          {title}
          {onRemove && (
            <button type="button" className="link hint min-h-11 font-normal" onClick={onRemove}>
              Take out
              <span className="visually-hidden"> {title}</span>
            </button>
          )}
        </span>
      </legend>
      <div className="clear-both pt-px">{children}</div>
    </fieldset>
  );
}

export function AddRow({ children, onClick }: { children: ReactNode; onClick: () => void }) {
  return (
    <p className="mt-4">
      <Button look="plain" onClick={onClick}>
        {children}
      </Button>
    </p>
  );
}

/** Fields side by side on a desk, one under the other on a phone. Their inputs stand on one line whatever the labels' length. */
export function Columns({ children, three = false }: { children: ReactNode; three?: boolean }) {
  return <div className={`grid items-end gap-x-6 ${three ? 'sm:grid-cols-3' : 'sm:grid-cols-2'}`}>{children}</div>;
}

/** A head within a form. */
export function Part({ title, hint, children }: { title: string; hint?: ReactNode; children: ReactNode }) {
  return (
    <section className="mt-8 border-t-2 border-ink pt-4">
      <h2>{title}</h2>
      {hint && <p className="hint">{hint}</p>}
      {children}
    </section>
  );
}
