import type { Source, WorkingInput } from '../working.ts';
import { type Cycle, flowOf, type NettedFlow, viewOf } from './cycle-flows.ts';
import { addTo, nettedOver, producedOver } from './interval-flows.ts';
import type { Group } from './parts.ts';
import { NO_INPUTS } from './piece.ts';
import type { Netting } from './plan.ts';
import { compare, exactText, minus, type Qty, times } from './quantity.ts';
import type { Pricing } from './rates-in-force.ts';
import { refuse } from './refused.ts';

export type Basis = 'import' | 'export' | 'production' | 'load';

/** What kWh banks have taken off a charge's import, in all and by period. */
export type LessBank = { all: Qty; byPeriod: Readonly<Record<string, Qty>> };

/** kWh of an item over a group of days, before they are shared between parts: `n / d` thousandths of kWh, said as `top / bottom` of the inputs. */
export type Figure = {
  basis: Basis;
  label: string;
  period: string | null;
  n: Qty;
  d: Qty;
  top: string;
  bottom: string;
  inputs: WorkingInput[];
};

type Asked = { label: string; basis: Basis; netting: Netting; pricing: Pricing; lessBank: LessBank | null };

const SOURCES: Record<Basis | 'fromBank', Source> = {
  import: { kind: 'figure', name: 'import' },
  export: { kind: 'figure', name: 'export' },
  production: { kind: 'figure', name: 'production' },
  load: { kind: 'figure', name: 'load' },
  fromBank: { kind: 'figure', name: 'kWh bank' },
};
const NAMES: Record<Basis, string> = { import: 'Import', export: 'Export', production: 'Production', load: 'Use' };
const NETTED: Record<Exclude<Netting, 'none'>, string> = {
  '15min': ', netted in each quarter-hour',
  hour: ', netted in each hour',
  period: ', netted in each period',
  cycle: ', netted over the cycle',
};

export function basisInput(name: string, label: string, value: Qty, basis: Basis | 'fromBank'): WorkingInput {
  return { name, label, value: exactText(value), unit: 'kWh', source: SOURCES[basis] };
}

/** Whether the item's kWh can be told interval by interval: both by the plan's word and by the data. */
export function canUseIntervals(cycle: Cycle, item: Asked): boolean {
  const { plan } = cycle.prepared;
  if (plan.rateChangeBy !== 'intervals' && plan.seasonBy !== 'intervals') return false;
  if (item.basis === 'load' && plan.load === 'metered') return false;
  return (
    item.basis === 'production' || item.basis === 'load' || (item.netting !== 'period' && item.netting !== 'cycle')
  );
}

/** The kWh of an item over a group of days: one figure, or one per time-of-use period in the calendar's order. */
export function figuresOf(cycle: Cycle, item: Asked, group: Group): Figure[] {
  const { basis, pricing, lessBank } = item;
  const label =
    (basis === 'import' || basis === 'export') && item.netting !== 'none'
      ? NAMES[basis] + NETTED[item.netting]
      : NAMES[basis];
  const flow = group.whole ? wholeFlow(cycle, item) : groupFlow(cycle, item, group);
  if (!pricing.byPeriod) {
    const all = group.whole || !lessBank ? null : amounts(wholeFlow(cycle, item), null);
    return [figure(cycle, basis, label, null, flow.total, lessBank?.all ?? 0, all)];
  }
  const { byPeriod } = flow;
  if (!byPeriod) return refuse(`${item.label} is priced by period: ${NAMES[basis].toLowerCase()} by period is needed.`);
  const figures: Figure[] = [];
  for (const period of cycle.prepared.period.values()) {
    const amount = byPeriod[period.id];
    if (amount === undefined) continue;
    const all = group.whole || !lessBank ? null : amounts(wholeFlow(cycle, item), period.id);
    const name = `${label}, ${period.label || period.id}`;
    figures.push(figure(cycle, basis, name, period.id, amount, lessBank?.byPeriod[period.id] ?? 0, all));
  }
  return figures;
}

function figure(
  cycle: Cycle,
  basis: Basis,
  label: string,
  period: string | null,
  amount: number,
  used: Qty,
  all: number | null,
): Figure {
  const inputs = cycle.says ? [basisInput('kWh', label, amount, basis)] : NO_INPUTS;
  if (compare(used, 0) === 0) return { basis, label, period, n: amount, d: 1, top: 'kWh', bottom: '', inputs };
  const fromBank = basisInput('fromBank', 'Taken from the kWh bank', used, 'fromBank');
  if (all === null || all === 0) {
    return {
      basis,
      label,
      period,
      n: minus(amount, used),
      d: 1,
      top: '(kWh - fromBank)',
      bottom: '',
      inputs: [...inputs, fromBank],
    };
  }
  // A bank pays over the cycle as a whole: each stretch of it is lowered in the same proportion.
  const whole = basisInput('all', `${label}, in the whole cycle`, all, basis);
  const n = times(amount, minus(all, used));
  return {
    basis,
    label,
    period,
    n,
    d: all,
    top: 'kWh * (all - fromBank)',
    bottom: 'all',
    inputs: [...inputs, whole, fromBank],
  };
}

type Flow = { total: number; byPeriod: Record<string, number> | null };

function amounts(flow: Flow, period: string | null): number {
  return period === null ? flow.total : (flow.byPeriod?.[period] ?? 0);
}

function wholeFlow(cycle: Cycle, item: Asked): Flow {
  const { usage, prepared } = cycle;
  switch (item.basis) {
    case 'import':
    case 'export':
      return side(flowOf(cycle, item.netting), item.basis, item.pricing.byPeriod);
    case 'production':
      return {
        total: produced(cycle, item.label),
        byPeriod: item.pricing.byPeriod ? periodsOf(cycle, 'production') : null,
      };
    case 'load':
      if (prepared.plan.load === 'metered') {
        return {
          total: usage.loadWh ?? refuse(`${item.label} is charged on the load meter: its kWh are needed.`),
          byPeriod: statedPeriods(cycle, 'load'),
        };
      }
      return {
        total: usage.importWh + produced(cycle, item.label) - usage.exportWh,
        byPeriod: item.pricing.byPeriod ? periodsOf(cycle, 'load') : null,
      };
  }
}

function produced(cycle: Cycle, label: string): number {
  return cycle.usage.productionWh ?? refuse(`${label} goes by production: the production of this cycle is needed.`);
}

function periodsOf(cycle: Cycle, basis: 'production' | 'load'): Record<string, number> | null {
  if (!cycle.usage.intervals) return statedPeriods(cycle, basis);
  return intervalFlow(cycle, basis, 'none', cycle.from, cycle.to).byPeriod;
}

function statedPeriods({ usage }: Cycle, basis: 'production' | 'load'): Record<string, number> | null {
  if (!usage.ownByPeriod) return null;
  const byPeriod: Record<string, number> = {};
  for (const [period, own] of Object.entries(usage.ownByPeriod))
    byPeriod[period] = basis === 'production' ? own.productionWh : own.loadWh;
  return byPeriod;
}

function groupFlow(cycle: Cycle, item: Asked, group: Group): Flow {
  return intervalFlow(cycle, item.basis, item.netting, group.from, group.to);
}

function intervalFlow(cycle: Cycle, basis: Basis, netting: Netting, from: Group['from'], to: Group['to']): Flow {
  const view = viewOf(cycle);
  if (basis === 'production') return producedOver(view, from, to);
  const plainNetting = netting === '15min' || netting === 'hour' ? netting : 'none';
  const flow = nettedOver(view, basis === 'load' ? 'none' : plainNetting, from, to);
  if (basis !== 'load') return side(flow, basis, true);
  const made = producedOver(view, from, to);
  const total = flow.import + made.total - flow.export;
  if (!flow.byPeriod) return { total, byPeriod: null };
  const byPeriod = { ...made.byPeriod };
  for (const [period, { import: bought, export: sent }] of Object.entries(flow.byPeriod))
    addTo(byPeriod, period, bought - sent);
  return { total, byPeriod };
}

function side(flow: NettedFlow, basis: 'import' | 'export', withPeriods: boolean): Flow {
  if (!withPeriods || !flow.byPeriod) return { total: flow[basis], byPeriod: null };
  const byPeriod: Record<string, number> = {};
  for (const [period, part] of Object.entries(flow.byPeriod)) byPeriod[period] = part[basis];
  return { total: flow[basis], byPeriod };
}
