import type { ReactNode } from 'react';

/** A sheet of the book: a head, an optional hint and actions at its right. `bare` leaves paper and rule away. */
export function Sheet({
  title,
  hint,
  actions,
  bare,
  children,
}: {
  title?: ReactNode;
  hint?: ReactNode;
  actions?: ReactNode;
  bare?: boolean;
  children?: ReactNode;
}) {
  return (
    <section className={bare ? 'mt-[26px] pt-[22px]' : 'sheet'}>
      {(title || actions) && (
        <div className="flex flex-wrap items-baseline justify-between gap-x-7 gap-y-1">
          {title && <h2>{title}</h2>}
          {actions && <div className="flex flex-wrap items-baseline gap-x-5 gap-y-1">{actions}</div>}
        </div>
      )}
      {hint && <p className="hint mt-0.5 mb-2.5">{hint}</p>}
      {children}
    </section>
  );
}
