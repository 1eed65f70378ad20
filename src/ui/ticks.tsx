import type { ReactNode } from 'react';

export function Ticks({ children }: { children: ReactNode }) {
  return <div className="mt-1">{children}</div>;
}

/** One thing that is so or not. */
export function Tick({
  label,
  hint,
  checked,
  onChange,
}: {
  label: string;
  hint?: string;
  checked: boolean;
  onChange: (on: boolean) => void;
}) {
  return (
    <label className="flex min-h-11 items-start gap-3 py-2">
      <input
        type="checkbox"
        className="mt-1 size-5 shrink-0 accent-accent"
        checked={checked}
        onChange={(event) => onChange(event.target.checked)}
      />
      <span>
        {label}
        {hint && <span className="hint block">{hint}</span>}
      </span>
    </label>
  );
}
