import { type ReactNode, useState } from 'react';

/** A part of a form that most need not open. `summary` says what it holds while it is closed. */
export function Fold({
  title,
  summary,
  open: openAtFirst = false,
  children,
}: {
  title: ReactNode;
  summary?: ReactNode;
  open?: boolean;
  children: ReactNode;
}) {
  const [open, setOpen] = useState(openAtFirst);
  return (
    <details className="mt-4 border-t border-rule" open={open} onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary className="flex min-h-11 cursor-pointer flex-wrap items-baseline gap-x-3 py-2">
        <span className="font-semibold">
          <span aria-hidden="true" className="inline-block w-5 font-normal text-soft">
            {open ? '−' : '+'}
          </span>
          {title}
        </span>
        {summary && <span className="hint">{summary}</span>}
      </summary>
      <div className="pb-3">{children}</div>
    </details>
  );
}
