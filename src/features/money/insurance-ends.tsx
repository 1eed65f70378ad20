import { useState } from 'react';
import type { MortgageView } from '#shared/api/money-mortgage.ts';
import type { InsuranceEndRule } from '#shared/facts/finance.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { Field, SelectField } from '#src/ui/field.tsx';
import { Missing } from '#src/ui/money.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import { FigureButton } from '#src/ui/working.tsx';
import type { InsuranceProps } from './insurance-props.ts';
import { type EndBody, useMortgageChange } from './insurance-queries.ts';
import { type EndValues, readEnd } from './insurance-values.ts';
import { END_RULES } from './insurance-words.ts';

/** The days on which the insurance could have gone without the roof, each with its section of the law, and the one that counts. */
export function InsuranceEnds({ view, householdId, canEdit }: InsuranceProps) {
  const [choosing, setChoosing] = useState(false);
  const { governs } = view;
  return (
    <div className="min-w-0">
      <h3>When it could have gone without the roof</h3>
      <ul className="mt-1 border-t-2 border-ink">
        {view.ends.map((end) => (
          <End key={end.rule} end={end} counts={governs?.rule === end.rule} />
        ))}
      </ul>
      {governs && (
        <p className="mt-2">
          {governs.on ? (
            <>
              Counted until <b>{fullDate(governs.on)}</b>: {whyWords(view)}.
            </>
          ) : (
            `${governs.words}.`
          )}
          {canEdit && view.facts.kind === 'conventional' && (
            <>
              {' '}
              <button type="button" className="link no-print min-h-11 sm:min-h-6" onClick={() => setChoosing(true)}>
                Choose another day
              </button>
            </>
          )}
        </p>
      )}
      {choosing && <EndDialog view={view} householdId={householdId} onClose={() => setChoosing(false)} />}
    </div>
  );
}

/** Why this day: the owner's choice, the prudent first, or the mortgage's own end. */
function whyWords({ facts, governs }: MortgageView): string {
  const chosen = facts.insurance?.endRule ?? 'prudent';
  if (governs?.rule === null) return lowered(governs.words);
  if (chosen === governs?.rule) return 'the day you chose';
  return chosen === 'prudent' ? 'the first of these days, which claims least' : lowered(governs?.words ?? '');
}

function End({ end, counts }: { end: MortgageView['ends'][number]; counts: boolean }) {
  return (
    <li className="flex items-baseline justify-between gap-x-5 border-b border-rule py-2">
      <span className={counts ? 'font-semibold' : undefined}>
        {capital(END_RULES[end.rule])}
        {counts && <span className="font-normal text-soft">, counts</span>}
        <span className="hint block font-normal">
          {end.words}.{end.source && ` ${end.source}.`}
        </span>
        {end.most && (
          <span className="block text-[15px] font-normal">
            At most{' '}
            <FigureButton
              title={`${capital(END_RULES[end.rule])}: the most the balance may be`}
              text={money(end.most.amountCents)}
              working={end.most.working}
            />
          </span>
        )}
      </span>
      <span className={counts ? 'whitespace-nowrap font-semibold' : 'whitespace-nowrap'}>
        {end.on ? fullDate(end.on) : <Missing reason="Never, or not known" />}
      </span>
    </li>
  );
}

const CHOICES: readonly InsuranceEndRule[] = ['prudent', 'request80', 'automatic78', 'midpoint', 'appreciation'];

function EndDialog({ view, householdId, onClose }: { view: MortgageView; householdId: string; onClose: () => void }) {
  const change = useMortgageChange(householdId);
  const insurance = view.facts.insurance;
  return (
    <SaveDialog<EndValues, EndBody>
      title="The day that counts"
      hint="Insurance not paid is counted until the day it could have gone without the roof. The first of all days claims least; another can be nearer to what you would have done."
      defaults={{ endRule: insurance?.endRule ?? 'prudent', appreciationOn: insurance?.appreciationOn ?? '' }}
      read={readEnd}
      save={(body) => change.mutateAsync({ kind: 'putEnd', body })}
      onClose={onClose}
    >
      {({ register, formState: { errors } }) => (
        <>
          <SelectField label="It counts until" error={errors.endRule?.message} {...register('endRule')}>
            {CHOICES.map((rule) => (
              <option key={rule} value={rule}>
                {END_RULES[rule]}
              </option>
            ))}
          </SelectField>
          <Field
            label="Value alone was enough on"
            hint="The day on which the home’s value, without the roof, would have been enough. Leave empty if you cannot say."
            type="date"
            error={errors.appreciationOn?.message}
            {...register('appreciationOn')}
          />
        </>
      )}
    </SaveDialog>
  );
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

function lowered(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}
