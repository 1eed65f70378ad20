import { Choices, Field } from '../field.tsx';
import { Fold } from '../fold.tsx';
import { Columns } from '../rows.tsx';
import { Tick, Ticks } from '../ticks.tsx';
import { changed, usePlanEdit } from './edit.ts';
import type { CreditForm } from './plan-form.ts';
import { ShareFields } from './share-fields.tsx';
import { WordSelect } from './small-fields.tsx';
import { NETTING_WORDS } from './words.ts';

/** What earns, at what price, and where it goes: a credit for energy, or an incentive on the bill. */
export function CreditFields({ credit, at }: { credit: CreditForm; at: number }) {
  const { form, set, text, error, name } = usePlanEdit();
  const path = `credits.${at}`;
  const put = (changes: Partial<CreditForm>) => set({ credits: changed(form.credits, at, changes) });
  const banks = form.banks.filter(({ unit }) => unit === 'USD').map(({ id, label }) => [id, `into ${label}`] as const);
  const more = credit.termFrom !== '' || credit.capAmount !== '';
  return (
    <>
      <Columns>
        <Field
          label="Name, as the bill prints it"
          {...text(`${path}.label`, credit.label, (label) => put({ label }))}
        />
        <WordSelect
          label="It is earned by"
          value={credit.basis}
          words={[
            ['export', 'each kWh you send out'],
            ['production', 'each kWh the roof makes'],
          ]}
          onChange={(basis) => put({ basis })}
        />
        <WordSelect
          label="It goes"
          error={error(`${path}.to`)}
          value={credit.to}
          words={[...banks, ['bill', 'off this bill'], ['separate', 'to you, paid apart from the bill']]}
          onChange={(to) => put({ to })}
        />
        {credit.basis === 'export' && (
          <WordSelect
            label="What you buy is taken off first"
            error={error(`${path}.netting`)}
            value={credit.netting}
            words={[
              ['', `${NETTING_WORDS[form.netting].split(':')[0]}, as said above`],
              ...(Object.entries(NETTING_WORDS) as [CreditForm['netting'], string][]),
            ]}
            onChange={(netting) => put({ netting })}
          />
        )}
      </Columns>
      <Choices
        legend="Its price is"
        name={name(`${path}.priced`)}
        value={credit.priced}
        onChange={(priced) => put({ priced: priced === 'share' ? 'share' : 'own' })}
        options={[
          { value: 'own', label: 'a price of its own', hint: 'Below, among the prices by date.' },
          { value: 'share', label: 'the retail price, or a share of it' },
        ]}
      />
      {credit.priced === 'share' && <ShareFields part={credit} path={path} put={put} />}
      {credit.priced === 'own' && (form.seasons.length > 0 || form.periods.length > 0) && (
        <Ticks>
          {form.seasons.length > 0 && (
            <Tick
              label="Its price differs by season"
              checked={credit.bySeason}
              onChange={(bySeason) => put({ bySeason })}
            />
          )}
          {form.periods.length > 0 && (
            <Tick
              label="Its price differs by time of day"
              checked={credit.byPeriod}
              onChange={(byPeriod) => put({ byPeriod })}
            />
          )}
        </Ticks>
      )}
      <Fold
        title="For how long, and how much at most"
        open={more}
        summary={more ? undefined : 'without an end or a limit'}
      >
        <Columns>
          <Field
            label="First day"
            type="date"
            {...text(`${path}.termFrom`, credit.termFrom, (termFrom) => put({ termFrom }))}
          />
          <Field label="Last day" type="date" {...text(`${path}.termTo`, credit.termTo, (termTo) => put({ termTo }))} />
          <Field
            label="At most"
            unit="$"
            inputMode="decimal"
            {...text(`${path}.capAmount`, credit.capAmount, (capAmount) => put({ capAmount }))}
          />
          <WordSelect
            label="That limit is"
            value={credit.capPer}
            words={[
              ['year', 'for each year'],
              ['term', 'in all'],
            ]}
            onChange={(capPer) => put({ capPer })}
          />
        </Columns>
      </Fold>
    </>
  );
}
