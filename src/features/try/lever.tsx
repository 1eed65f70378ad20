import type { ReactNode } from 'react';
import type { LeverName } from './lever-texts.ts';
import type { Tryout } from './use-try.ts';

/** One lever: a tick that pulls it, its controls while it is pulled, and a way back. */
export function Lever({
  tryout,
  name,
  label,
  hint,
  children,
}: {
  tryout: Tryout;
  name: LeverName;
  label: string;
  hint?: string | null;
  children?: ReactNode;
}) {
  const { pulled } = tryout.draft.texts[name];
  const error = tryout.errorAt(name);
  return (
    <fieldset className="min-w-0 border-b border-rule">
      <legend className="visually-hidden">{label}</legend>
      <div className="flex items-start justify-between gap-4">
        <label className="flex min-h-11 grow items-start gap-3 py-2">
          <input
            type="checkbox"
            className="mt-1 size-5 shrink-0 accent-accent"
            checked={pulled}
            onChange={(event) => tryout.set(name, { pulled: event.target.checked })}
          />
          <span className={pulled ? 'font-semibold' : ''}>{label}</span>
        </label>
        {pulled && (
          <button type="button" className="link hint min-h-11" onClick={() => tryout.reset(name)}>
            Reset
            <span className="visually-hidden">: {label}</span>
          </button>
        )}
      </div>
      {error && <p className="field-error pb-2 pl-8">{error}</p>}
      {pulled && (children || hint) && (
        <div className="pb-5 pl-8">
          {hint && <p className="hint">{hint}</p>}
          {children}
        </div>
      )}
    </fieldset>
  );
}
