import type { RatePlan } from '#shared/settlement/plan.ts';
import type { SettledAmounts } from '#shared/settlement/settle.ts';
import type { CycleUsage } from '#shared/settlement/settlement.ts';

/** Parts of the plan language that a house uses, and what they did in its bills: to count whether drawn houses try all of it. */
export function featuresOf(
  plan: RatePlan,
  cycles: readonly CycleUsage[],
  settled: readonly SettledAmounts[],
): string[] {
  const found: string[] = [
    `netting ${plan.netting}`,
    `rate change by ${plan.rateChangeBy}`,
    `season by ${plan.seasonBy}`,
  ];
  const add = (feature: string, is: boolean) => is && found.push(feature);
  for (const [what, how] of Object.entries(plan.rounding)) found.push(`${what} ${how}`);
  const rates = [...plan.charges, ...plan.credits].flatMap((item) => item.rates ?? []);
  add(
    'price by season',
    rates.some((row) => row.season !== undefined),
  );
  add(
    'price by period',
    rates.some((row) => row.period !== undefined),
  );
  add(
    'price changes inside a cycle',
    cycles.some(({ from, to }) => rates.some((row) => row.from > from && row.from < to)),
  );
  add(
    'netting of a component',
    plan.charges.some((one) => one.netting !== null && one.netting !== plan.netting),
  );
  add(
    'rates of another charge',
    plan.credits.some((one) => one.ratesOf !== null),
  );
  add(
    'interval data',
    cycles.some((one) => one.intervals !== null),
  );
  for (const charge of plan.charges) {
    found.push(`charge by ${charge.basis}${charge.kWOf === null || charge.basis !== 'kW' ? '' : ` ${charge.kWOf}`}`);
    for (const tiers of charge.tiers) found.push(`${tiers.limits.length + 1} tiers per ${tiers.per}`);
    if (charge.per !== null) found.push(`floor per ${charge.per}`);
    add('tax after credits', charge.afterCredits);
  }
  for (const credit of plan.credits) {
    found.push(`${credit.kind} credit on ${credit.basis}`, `${credit.kind} to ${placeOf(credit.to)}`);
    add('term', credit.term !== null);
    if (credit.cap) found.push(`cap per ${credit.cap.per}`);
    add(
      'negative incentive',
      (credit.rates ?? []).some((row) => row.rate.startsWith('-')),
    );
  }
  const units = plan.banks.filter((bank) => bank.offsets.length > 0).map((bank) => bank.unit);
  add('two kWh banks', units.filter((unit) => unit === 'kWh').length > 1);
  add('two USD banks', units.filter((unit) => unit === 'USD').length > 1);
  for (const bank of plan.banks) {
    found.push(`${bank.unit} bank`);
    add('bank by period', bank.byPeriod);
    add('bank ratio', bank.ratio !== '1');
    add(`${bank.unit} bank in lots`, bank.lotLife !== null);
    add(`${bank.unit} bank below zero`, bank.belowZero);
    add(`${bank.unit} bank in the same cycle`, bank.sameCycle);
    add('minimum kept', bank.keepMinimum !== null);
    for (const { action, at, to, keep } of bank.trueUps) {
      found.push(`${bank.unit} true-up: ${action}${to === null ? '' : ` to ${to}`}`);
      found.push(`true-up at ${typeof at === 'string' ? at : Object.keys(at).join()}`);
      if (keep) found.push('usage' in keep ? `keeps by ${keep.usage}` : 'keeps an amount');
    }
  }
  for (const { settlement } of settled) {
    for (const { unit, move } of settlement.banks) {
      for (const what of ['earned', 'used', 'expired', 'paid'] as const)
        add(`${unit} ${what}`, move[what] !== '0' && move[what] !== '0.00');
    }
    add(
      'a floor made up',
      settlement.lines.some((line) => line.kind === 'minimum' && line.component === 'least' && line.amountCents > 0),
    );
    add('a bill below zero', settlement.amountDueCents < 0);
    add(
      'a fee kept back',
      [...settlement.lines, ...settlement.payouts].some((line) => line.label.endsWith('fee')),
    );
    add(
      'an incentive paid apart',
      settlement.payouts.some((line) => line.kind === 'incentive'),
    );
  }
  return found;
}

function placeOf(to: string): string {
  return to === 'bill' || to === 'separate' ? to : 'a bank';
}

/** All of them: a list by hand, so that one that is no longer drawn is missed. */
export const ALL_FEATURES = [
  ...['none', '15min', 'hour', 'period', 'cycle'].map((netting) => `netting ${netting}`),
  ...['days', 'readDate', 'intervals'].flatMap((by) => [`rate change by ${by}`, `season by ${by}`]),
  ...['money halfUp', 'money halfEven', 'limits whole', 'limits exact', 'kWh exact', 'kWh whole'],
  ...['price by season', 'price by period', 'price changes inside a cycle'],
  ...['netting of a component', 'rates of another charge', 'interval data'],
  ...['import', 'load', 'cycle', 'day', 'kW dc', 'kW ac', 'kW demand', 'percent', 'floor'].map(
    (by) => `charge by ${by}`,
  ),
  ...['2 tiers per cycle', '3 tiers per cycle', '2 tiers per day', '3 tiers per day'],
  ...['floor per cycle', 'floor per day', 'tax after credits', 'minimum kept', 'a floor made up'],
  ...['export credit on export', 'export credit on production', 'incentive credit on production'],
  ...['export to bill', 'export to a bank', 'incentive to bill', 'incentive to separate', 'an incentive paid apart'],
  ...['term', 'cap per year', 'cap per term', 'negative incentive'],
  ...['two kWh banks', 'two USD banks', 'bank by period', 'bank ratio'],
  ...['kWh', 'USD'].flatMap((unit) => [
    `${unit} bank`,
    ...['in lots', 'below zero', 'in the same cycle'].map((how) => `${unit} bank ${how}`),
    ...['expire', 'donate', 'pay to bill', 'pay to separate'].map((action) => `${unit} true-up: ${action}`),
    ...['earned', 'used', 'expired', 'paid'].map((what) => `${unit} ${what}`),
  ]),
  ...['months', 'date', 'everyCycle', 'finalBill'].map((at) => `true-up at ${at}`),
  ...['keeps an amount', 'keeps by import', 'keeps by load', 'keeps by net', 'a bill below zero', 'a fee kept back'],
];
