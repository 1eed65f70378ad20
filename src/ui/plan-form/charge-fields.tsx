import { Choices, Field } from '../field.tsx';
import { Columns } from '../rows.tsx';
import { Tick, Ticks } from '../ticks.tsx';
import { withoutCharge } from './change-charges.ts';
import { changed, toggled, usePlanEdit, without } from './edit.ts';
import { minimumTaxOf, taxesOn, withMinimumTax } from './minimum-tax.ts';
import type { ChargeForm } from './plan-form.ts';
import { TickList, WordSelect } from './small-fields.tsx';
import { Tiers } from './tier-fields.tsx';
import { BASIS_WORDS, KIND_WORDS, NETTING_WORDS } from './words.ts';

const ENERGY: readonly ChargeForm['basis'][] = ['import', 'export', 'production', 'load'];

function wordsOf<T extends string>(words: Record<T, string>): (readonly [T, string])[] {
  return (Object.entries(words) as [T, string][]).map(([value, text]) => [value, text] as const);
}

/** The questions of one charge. Its prices stand further down, by date. */
export function ChargeFields({ charge, at }: { charge: ChargeForm; at: number }) {
  const { form, set, text, error, name } = usePlanEdit();
  const path = `charges.${at}`;
  const put = (changes: Partial<ChargeForm>) => set({ charges: changed(form.charges, at, changes) });
  const byKwh = ENERGY.includes(charge.basis);
  const before = form.charges.slice(0, at).map(({ id, label }) => ({ value: id, label }));
  return (
    <>
      <Columns>
        <Field
          label="Name, as the bill prints it"
          {...text(`${path}.label`, charge.label, (label) => put({ label }))}
        />
        <WordSelect label="It is" value={charge.kind} words={wordsOf(KIND_WORDS)} onChange={(kind) => put({ kind })} />
        <WordSelect
          label="It is charged on"
          value={charge.basis}
          words={wordsOf(BASIS_WORDS)}
          error={error(`${path}.basis`)}
          onChange={(basis) =>
            set({
              charges: changed(form.charges, at, {
                basis,
                per: basis === 'floor' ? charge.per || 'cycle' : '',
                kWOf: basis === 'kW' ? charge.kWOf || 'dc' : '',
                ...(ENERGY.includes(basis) ? {} : { byPeriod: false, tiers: [] }),
              }),
              // All the house uses has to be known from something.
              ...(basis === 'load' && form.load === 'none' ? { load: 'computed' as const } : {}),
            })
          }
        />
        {(charge.basis === 'import' || charge.basis === 'export') && (
          <WordSelect
            label="What you send out reduces it"
            error={error(`${path}.netting`)}
            value={charge.netting}
            words={[['', 'as the plan says below'], ...wordsOf(NETTING_WORDS)]}
            onChange={(netting) => put({ netting })}
          />
        )}
        {charge.basis === 'kW' && (
          <WordSelect
            label="Which kW"
            error={error(`${path}.kWOf`)}
            value={charge.kWOf}
            words={[
              ['dc', 'of the modules (DC)'],
              ['ac', 'of the inverter (AC)'],
              ['demand', 'the house’s highest demand'],
            ]}
            onChange={(kWOf) => put({ kWOf })}
          />
        )}
        {charge.basis === 'floor' && (
          <WordSelect
            label="The least amount is"
            value={charge.per}
            words={[
              ['cycle', 'for each bill'],
              ['day', 'for each day'],
            ]}
            onChange={(per) => put({ per })}
          />
        )}
      </Columns>
      {charge.kind === 'fixed' && (charge.basis === 'cycle' || charge.basis === 'day') && (
        <Choices
          legend={`${charge.label || 'It'} is`}
          name={name(`${path}.per`)}
          value={charge.basis}
          onChange={(basis) => put({ basis: basis === 'day' ? 'day' : 'cycle' })}
          options={[
            { value: 'cycle', label: 'the same on every bill' },
            { value: 'day', label: 'by the day' },
          ]}
        />
      )}
      {(charge.basis === 'percent' || charge.basis === 'floor') && (
        <TickList
          legend={charge.basis === 'percent' ? 'It is on' : 'It tops up'}
          hint={before.length === 0 ? 'There is no charge above it yet.' : undefined}
          error={error(`${path}.on`)}
          options={before}
          ticked={charge.on}
          onChange={(id, on) => put({ on: inOrder(toggled(charge.on, id, on), before) })}
        />
      )}
      {charge.basis === 'floor' && taxesOn(form, charge).length > 0 && (
        <Choices
          legend="Is tax on top of it?"
          name={name(`${path}.minimumTax`)}
          value={minimumTaxOf(form, charge) ?? ''}
          onChange={(value) => set({ charges: withMinimumTax(form, charge, value === 'after' ? 'after' : 'before') })}
          options={[
            { value: 'before', label: 'Yes: the bill before tax comes to at least this, and is taxed' },
            { value: 'after', label: 'No: the bill with its tax comes to at least this' },
          ]}
        />
      )}
      {charge.basis === 'percent' && (
        <Choices
          legend="It is worked out"
          name={name(`${path}.afterCredits`)}
          value={charge.afterCredits ? 'after' : 'before'}
          onChange={(value) => put({ afterCredits: value === 'after' })}
          options={[
            { value: 'after', label: 'on what credits leave to pay' },
            { value: 'before', label: 'on the charges before credits' },
          ]}
        />
      )}
      <Ticks>
        {form.seasons.length > 0 && (
          <Tick
            label="Its price differs by season"
            checked={charge.bySeason}
            onChange={(bySeason) => put({ bySeason })}
          />
        )}
        {byKwh && form.periods.length > 0 && (
          <Tick
            label="Its price differs by time of day"
            checked={charge.byPeriod}
            onChange={(byPeriod) => put({ byPeriod })}
          />
        )}
        {byKwh && (
          <Tick
            label="Its price rises or falls with the kWh used (tiers)"
            checked={charge.tiers.length > 0}
            onChange={(on) =>
              put({ tiers: on ? [{ from: form.prices[0]?.from ?? '', season: '', per: 'cycle', limits: '' }] : [] })
            }
          />
        )}
        <Tick
          label="It is charged only because of the roof"
          checked={charge.solarOnly}
          onChange={(solarOnly) => put({ solarOnly })}
        />
        {byKwh && (
          <Tick
            label="Its price changes with every bill and is read from it (fuel, purchased power)"
            checked={charge.learned}
            onChange={(learned) => put({ learned })}
          />
        )}
      </Ticks>
      {charge.tiers.length > 0 && <Tiers charge={charge} path={path} put={put} />}
      {error(`${path}.tiers`) && <span className="field-error">{error(`${path}.tiers`)}</span>}
      <p className="mt-3 flex flex-wrap gap-x-5">
        {at > 0 && (
          <button
            type="button"
            className="link hint min-h-11"
            onClick={() => {
              const charges = without(form.charges, at);
              charges.splice(at - 1, 0, charge);
              set({ charges });
            }}
          >
            Move {charge.label || 'this charge'} up
          </button>
        )}
        <button type="button" className="link hint min-h-11" onClick={() => set(withoutCharge(form, charge.id))}>
          Take out {charge.label || 'this charge'}
        </button>
      </p>
    </>
  );
}

function inOrder(ids: string[], options: readonly { value: string }[]): string[] {
  return options.map(({ value }) => value).filter((id) => ids.includes(id));
}
