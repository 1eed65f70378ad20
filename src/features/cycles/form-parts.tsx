import type { ReactNode } from 'react';

/** Fields side by side, as many as fit. */
export function Row({ children }: { children: ReactNode }) {
  return (
    <div className="grid items-end gap-x-4 [grid-template-columns:repeat(auto-fill,minmax(min(148px,100%),1fr))]">
      {children}
    </div>
  );
}

export function Group({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="mt-7">
      <h3 className="border-b-2 border-ink pb-1">{title}</h3>
      {children}
    </section>
  );
}

export function Remove({ what, onClick }: { what: string; onClick: () => void }) {
  return (
    <button type="button" className="link min-h-11 text-[15px]" onClick={onClick} aria-label={`Remove ${what}`}>
      Remove
    </button>
  );
}
