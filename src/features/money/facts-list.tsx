import type { ReactNode } from 'react';

export type FactsRow = { label: ReactNode; value: ReactNode; hint?: ReactNode; total?: boolean };

/** Ruled label and value rows. `total` draws the double rule. */
export function FactsList({ rows }: { rows: FactsRow[] }) {
  return (
    <dl className="mt-2 border-t-2 border-ink">
      {rows.map((row, index) => (
        <div
          // biome-ignore lint/suspicious/noArrayIndexKey: a fixed list
          key={index}
          className={`flex items-baseline justify-between gap-x-5 py-2 ${row.total ? 'border-t border-b-4 border-double border-ink font-bold' : 'border-b border-rule'}`}
        >
          <dt className="min-w-0">
            {row.label}
            {row.hint && <span className="hint block">{row.hint}</span>}
          </dt>
          <dd className="whitespace-nowrap text-right">{row.value}</dd>
        </div>
      ))}
    </dl>
  );
}
