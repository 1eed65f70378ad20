import { STATED_PROFILE_WORDS } from '../metering/stated-profile.ts';
import type { RatePlan } from '../settlement/plan.ts';
import type { Period } from './periods.ts';
import type { ShareSource, SourcedShares } from './year-shares.ts';

/** How the first year's months are shared out between periods and clock hours. */
export type SharedMonths = {
  months: Record<ShareSource, number>;
  /** Whether what the roof feeds the house is shared by the shape of its readings in every month. */
  hasSelf: boolean;
  /** The plan goes by periods; it nets by clock blocks, and of those no reading tells what cancels. */
  byPeriod: boolean;
  byBlock: boolean;
  cancelsUnknown: boolean;
};

const YEAR = 12;

/** Looks through the first twelve whole months; null where no plan of theirs asks for periods or clock hours. */
export function sharedMonths(
  months: readonly { period: Period; plan: RatePlan }[],
  sharesAt: (at: number) => SourcedShares | null,
): SharedMonths | null {
  const found: SharedMonths = {
    months: { record: 0, hours: 0, stated: 0 },
    hasSelf: true,
    byPeriod: false,
    byBlock: false,
    cancelsUnknown: false,
  };
  let count = 0;
  for (const [at, { plan }] of months.slice(0, YEAR + 1).entries()) {
    const shared = at === 0 && months.length > YEAR ? null : sharesAt(at);
    if (shared === null) continue;
    count += 1;
    found.months[shared.source] += 1;
    if (!shared.hasSelf) found.hasSelf = false;
    if (plan.calendar.periods.length > 0) found.byPeriod = true;
    for (const block of ['hour', '15min'] as const) {
      if (!netsBy(plan, block)) continue;
      found.byBlock = true;
      if (!shared.cancelsKnown[block]) found.cancelsUnknown = true;
    }
  }
  return count === 0 ? null : found;
}

function netsBy(plan: RatePlan, block: 'hour' | '15min'): boolean {
  return (
    plan.netting === block || [...plan.charges, ...plan.credits, ...plan.banks].some((item) => item.netting === block)
  );
}

/** The assumptions this makes, with where they come from. */
export function sharedAssumptions({ months, hasSelf, byPeriod, byBlock, cancelsUnknown }: SharedMonths) {
  const stated: { name: string; label: string; value: string; source: string }[] = [];
  if (byPeriod) {
    const parts = [
      months.record > 0 ? `${months.record} months as the record’s cycles were` : null,
      months.hours > 0 ? `${months.hours} months by the hours of the readings` : null,
      months.stated > 0 ? `${months.stated} months by ${STATED_PROFILE_WORDS}` : null,
    ].filter((part) => part !== null);
    const isEstimate = months.stated > 0 || months.hours > 0;
    stated.push({
      name: 'periods',
      label: 'Import and export by time-of-use period',
      value: `${isEstimate ? 'estimated: ' : ''}${parts.join(', ')}`,
      source: months.stated > 0 ? 'Common practice: the readings do not say it' : 'Your own readings',
    });
    if (!hasSelf) {
      stated.push({
        name: 'selfUse',
        label: 'When the house uses its own production, for the bill without the roof',
        value: 'estimated: from 6:00 to 18:00, most at noon',
        source: 'Common practice: production is not read by the hour',
      });
    }
  }
  if (byBlock) {
    stated.push({
      name: 'netting',
      label: 'Import that export cancels inside clock hours',
      value: cancelsUnknown ? 'estimated: none, so that the bill is rather too high' : 'as recorded',
      source: cancelsUnknown ? 'No readings fine enough' : 'Your own readings',
    });
  }
  return stated;
}
