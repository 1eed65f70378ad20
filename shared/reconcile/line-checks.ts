import type { PrintedLine } from '../facts/papers.ts';
import { sayMoney } from '../ledger/say.ts';
import type { RatePlan } from '../settlement/plan.ts';
import { cents, dollarsText, sumCents } from '../units/cents.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { isCarried } from './electric-lines.ts';
import { type LineGroup, priceOf } from './line-price.ts';
import { compareCents, nothingToCompare } from './make-check.ts';
import { wordsOf } from './match.ts';
import { matchParts, partKey } from './match-parts.ts';
import { LINE_TOLERANCE_CENTS } from './tolerance.ts';

/**
 * Each printed line at the plan's price for its *billed* quantity, kept apart from the quantity's own check (ledger.md §4); taxes on their base of
 * billed lines. A component priced by period or tier has a check for each; lines of one price (one that changes inside the cycle) are taken
 * together, a cent for each. Where tiers are told apart and each is priced right, their sum says whether they end where the plan says.
 */
export function linePriceChecks(context: CheckContext): Check[] {
  const { paper, settled } = context;
  if (settled.plan === null || paper.split !== null) return [];
  const { plan } = settled.plan;
  const parts = matchParts(paper.lines, settled.components, plan, settled.ours?.settlement.lines ?? []);
  const groups = new Map<string, LineGroup>();
  const made: (LineGroup | Check)[] = [];
  paper.lines.forEach((line, at) => {
    const component = settled.components[at] ?? null;
    if (component === null) {
      if (!isCarried(line, null)) made.push(unknownLine(line, at));
      return;
    }
    if (plan.banks.some((bank) => bank.id === component)) return;
    const part = parts[at] ?? null;
    const key = partKey(component, part);
    const known = groups.get(key);
    if (known) {
      known.lines.push(line);
      return;
    }
    const group = { component, part, label: line.label, lines: [line] };
    groups.set(key, group);
    made.push(group);
  });
  const several = (component: string) => [...groups.values()].filter((one) => one.component === component).length > 1;
  const checks = made.map((one) =>
    'check' in one
      ? one
      : priceCheck(context, plan, several(one.component) ? partKey(one.component, one.part) : one.component, one),
  );
  return [...checks, ...tierSums(context, plan, [...groups.values()], checks)];
}

/** One check of the sum of a component's tiers, where each was found at its own price. */
function tierSums(
  context: CheckContext,
  plan: RatePlan,
  groups: readonly LineGroup[],
  checks: readonly Check[],
): Check[] {
  return plan.charges.flatMap((charge) => {
    const mine = groups.filter((one) => one.component === charge.id && one.part !== null && one.part.tier !== null);
    if (mine.length < 2) return [];
    const agree = mine.every((one) =>
      checks.some((check) => check.about === partKey(charge.id, one.part) && check.verdict === 'agrees'),
    );
    if (!agree) return [];
    const lines = mine.flatMap((one) => one.lines);
    const whole = { component: charge.id, part: null, label: charge.label, lines };
    return [priceCheck(context, plan, charge.id, whole, `Tiers of ${charge.label}`)];
  });
}

function priceCheck(
  context: CheckContext,
  plan: RatePlan,
  about: string,
  group: LineGroup,
  title = `Price of ${labelOf(plan, group)}`,
): Check {
  const { lines } = group;
  const label = labelOf(plan, group);
  const stated = sumCents(lines.map((line) => line.amountCents));
  const tolerance = cents(LINE_TOLERANCE_CENTS * lines.length);
  const priced = priceOf(context, plan, group, stated, tolerance);
  if ('why' in priced) {
    return nothingToCompare('linePrice', about, 'USD', { title, stated: dollarsText(stated), cause: priced.why });
  }
  return compareCents('linePrice', about, title, { stated, found: priced.amountCents, tolerance }, () => ({
    cause: `${label} is billed at ${sayMoney(stated)}; by the rate plan it is ${[priced.words(), sayMoney(priced.amountCents)].join(', ')}.`,
    advice:
      'Compare the rate printed with the plan. If the utility changed it, add the new rate to the plan with its date.',
  }));
}

/** The label as printed, with the period or tier it stands for where other lines have the same one. */
function labelOf(plan: RatePlan, { label, lines, part }: LineGroup): string {
  const period = plan.calendar.periods.find(({ id }) => id === part?.period);
  const words = wordsOf(label);
  const name = period?.label === '' ? period.id : period?.label;
  const named = name === undefined || [...wordsOf(name)].every((word) => words.has(word));
  const tier = part?.tier == null || lines.some((line) => /\d|first|over|tier/i.test(line.label)) ? null : part.tier;
  return [label, named ? null : name, tier === null ? null : `tier ${tier}`].filter((word) => word !== null).join(', ');
}

function unknownLine(line: PrintedLine, at: number): Check {
  return nothingToCompare('linePrice', `printed${at + 1}`, 'USD', {
    title: `Price of ${line.label}`,
    stated: dollarsText(line.amountCents),
    cause: 'The rate plan has no such line.',
    advice: 'If it belongs to your rates, add it to the plan; if not, ask the utility what it is for.',
  });
}
