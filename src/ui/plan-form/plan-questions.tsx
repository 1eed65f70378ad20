import { Field } from '../field.tsx';
import { Fold } from '../fold.tsx';
import { Columns } from '../rows.tsx';
import { CalendarPart } from './calendar-part.tsx';
import { ChargesPart } from './charges-part.tsx';
import { type FormFault, PlanEditProvider, useMakeEdit, usePlanEdit } from './edit.ts';
import { ExportPart } from './export-part.tsx';
import { Faults } from './faults.tsx';
import type { PlanForm } from './plan-form.ts';
import { PricesPart } from './prices-part.tsx';
import { WordSelect } from './small-fields.tsx';
import { CHANGE_WORDS } from './words.ts';

const NONE: readonly FormFault[] = [];

/**
 * A whole rate plan asked in the order of a rate sheet. `refused` are the server's faults by their path in the plan: each is said beside the
 * charge, credit or bank it is about (the rest belong to the page).
 */
export function PlanQuestions({
  form,
  onChange,
  faults,
  refused = [],
  showAll,
  prefix,
  bare = false,
}: {
  form: PlanForm;
  onChange: (form: PlanForm) => void;
  faults: readonly FormFault[];
  refused?: readonly FormFault[];
  showAll: boolean;
  prefix: string;
  /** A plan for a house without a roof: what is sent out is asked about only where the plan speaks of it. */
  bare?: boolean;
}) {
  // While a field is empty the server refuses for that alone; the field says so itself.
  const held = faults.length > 0 ? NONE : refused;
  const edit = useMakeEdit(form, onChange, faults, held, showAll, prefix);
  const faultsOf = (path: string) => [
    ...new Set(
      held.filter((fault) => fault.path === path || fault.path.startsWith(`${path}.`)).map(({ message }) => message),
    ),
  ];
  return (
    <PlanEditProvider value={edit}>
      <Field label="Its name, as the rate sheet says" {...edit.text('name', form.name, (name) => edit.set({ name }))} />
      <CalendarPart />
      <Faults messages={faultsOf('calendar')} />
      <ChargesPart faultsOf={faultsOf} />
      {(!bare || form.credits.length > 0 || form.banks.length > 0) && <ExportPart faultsOf={faultsOf} />}
      <PricesPart />
      <RulesPart />
    </PlanEditProvider>
  );
}

function RulesPart() {
  const { form, set } = usePlanEdit();
  const usual = form.rounding.money === 'halfUp' && form.rounding.limits === 'whole' && form.rounding.kWh === 'exact';
  const change = Object.entries(CHANGE_WORDS) as [typeof form.seasonBy, string][];
  const keptByLoad = form.banks.some(({ trueUps }) =>
    trueUps.some(({ keep, keepUsage }) => keep === 'average' && keepUsage === 'load'),
  );
  const byLoad = form.load !== 'none' || keptByLoad || form.charges.some(({ basis }) => basis === 'load');
  return (
    <div className="mt-8">
      <Fold title="When a price changes inside a billing cycle" summary={CHANGE_WORDS[form.rateChangeBy]}>
        <WordSelect
          label="When a new price begins"
          value={form.rateChangeBy}
          words={change}
          onChange={(rateChangeBy) => set({ rateChangeBy })}
        />
        {form.seasons.length > 0 && (
          <WordSelect
            label="When a season begins"
            value={form.seasonBy}
            words={change}
            onChange={(seasonBy) => set({ seasonBy })}
          />
        )}
      </Fold>
      {byLoad && (
        <Fold
          title="All the house uses"
          summary={form.load === 'metered' ? 'has a meter of its own' : 'is worked out'}
          open
        >
          <WordSelect
            label="It is known from"
            value={form.load}
            words={[
              ['none', 'nothing: no charge is on it'],
              ['computed', 'what was bought and made, less what was sent out'],
              ['metered', 'a meter of its own'],
            ]}
            onChange={(load) => set({ load })}
          />
        </Fold>
      )}
      <Fold title="How amounts are rounded" summary={usual ? 'as usual, to the cent' : 'in a way of its own'}>
        <Columns>
          <WordSelect
            label="Half a cent"
            value={form.rounding.money}
            words={[
              ['halfUp', 'is rounded up'],
              ['halfEven', 'is rounded to the even cent'],
            ]}
            onChange={(money) => set({ rounding: { ...form.rounding, money } })}
          />
          <WordSelect
            label="Limits worked out by days"
            value={form.rounding.limits}
            words={[
              ['whole', 'are whole kWh'],
              ['exact', 'are exact'],
            ]}
            onChange={(limits) => set({ rounding: { ...form.rounding, limits } })}
          />
          <WordSelect
            label="kWh shared by days"
            value={form.rounding.kWh}
            words={[
              ['exact', 'are exact'],
              ['whole', 'are whole kWh'],
            ]}
            onChange={(kWh) => set({ rounding: { ...form.rounding, kWh } })}
          />
        </Columns>
      </Fold>
    </div>
  );
}
