import { Field } from '#src/ui/field.tsx';
import type { LeverTexts } from './lever-texts.ts';
import type { Tryout } from './use-try.ts';

/** Levers that begin on a day, by the name of that day's field. */
type Dated = {
  on: 'paydown' | 'refinance' | 'replacement' | 'sale';
  from: 'exportCut' | 'plan' | 'moreUse';
};

/** The day of a lever. */
export function DayField<K extends keyof Dated>({
  tryout,
  lever,
  part,
  label,
}: {
  tryout: Tryout;
  lever: Dated[K];
  part: K;
  label: string;
}) {
  const texts: Partial<Record<string, string | boolean>> = tryout.draft.texts[lever];
  const path = `${lever}.${part}`;
  const value = texts[part];
  return (
    <Field
      label={label}
      type="date"
      className="max-w-[190px]"
      value={typeof value === 'string' ? value : ''}
      error={tryout.errorAt(path)}
      onChange={(event) => tryout.set(lever, { [part]: event.target.value } as Partial<LeverTexts[Dated[K]]>)}
      onBlur={() => tryout.leave(path)}
    />
  );
}
