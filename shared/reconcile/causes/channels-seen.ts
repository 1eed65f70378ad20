import type { RatePlan } from '../../settlement/plan.ts';
import type { CauseCycle, MeterChannel } from './cause.ts';

/**
 * Whether a mistake on a channel's register would show: the statement prints its kWh, or the plan makes something of them. One that would not cannot be
 * told from none.
 */
export function isSeen({ plan, billed }: CauseCycle, channel: MeterChannel): boolean {
  const { importWh, exportWh, productionWh } = billed;
  const printed = { import: importWh, export: exportWh, production: productionWh, load: null }[channel];
  return printed !== null || asksFor(plan, channel);
}

function asksFor(plan: RatePlan, channel: MeterChannel): boolean {
  const items = [...plan.charges, ...plan.credits];
  const onUse = items.some((item) => item.basis === 'load') || keepsByUse(plan);
  if (channel === 'load') return plan.load === 'metered' && onUse;
  if (items.some((item) => item.basis === channel) || (plan.load === 'computed' && onUse)) return true;
  return channel !== 'production' && (plan.banks.some((bank) => bank.unit === 'kWh') || nets(plan));
}

function keepsByUse({ banks }: RatePlan): boolean {
  return banks.some(({ trueUps }) =>
    trueUps.some(({ keep }) => keep !== null && 'usage' in keep && keep.usage === 'load'),
  );
}

function nets(plan: RatePlan): boolean {
  return [plan, ...plan.charges, ...plan.credits].some(({ netting }) => netting !== null && netting !== 'none');
}
