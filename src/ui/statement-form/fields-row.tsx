import type { ReactNode } from 'react';
import type { UseFormReturn } from 'react-hook-form';
import type { StatementFormValues } from './statement-values.ts';

export type Form = UseFormReturn<StatementFormValues, unknown, StatementFormValues>;

/** Three fields side by side on a desk. */
export function Three({ children }: { children: ReactNode }) {
  return <div className="grid items-end gap-x-6 sm:grid-cols-3">{children}</div>;
}

/** Takes a row of the form out. */
export function TakeOut({ what, onClick }: { what: string; onClick: () => void }) {
  return (
    <button type="button" className="link hint min-h-11 text-left" onClick={onClick}>
      Take out<span className="visually-hidden"> {what}</span>
    </button>
  );
}
