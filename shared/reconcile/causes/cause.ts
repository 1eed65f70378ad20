import type { RatePlan } from '../../settlement/plan.ts';
import type { CycleUsage, Opening } from '../../settlement/settlement.ts';
import type { Cents } from '../../units/cents.ts';
import type { Day } from '../../units/day.ts';
import type { Wh } from '../../units/energy.ts';

/** The mistakes that are tried; the reference's error fixtures name most of them (net-metering.md §3). */
export type CauseId =
  | 'registerRollover'
  | 'wrongMultiplier'
  | 'registersSwapped'
  | 'wrongRate'
  | 'bankLost'
  | 'excessNotBanked'
  | 'wrongDays'
  | 'meterExchange'
  | 'estimatedRead'
  | 'tiersOnGross'
  | 'grossForNet'
  | 'creditOnFixed'
  | 'trueUpEarly'
  | 'nonbypassableOnLoad'
  | 'incentiveOnExport'
  | 'creditedTwice'
  | 'exportShort';

export type MeterChannel = 'import' | 'export' | 'production' | 'load';

/** A register read as it truly was. */
export type TrueRead = {
  meter: string;
  channel: MeterChannel;
  from: Day;
  to: Day;
  previous: string;
  current: string;
  dials: number;
  multiplier: string;
};

/** A register read as the statement has it, and the energy made of it. */
export type BilledRead = { meter: string; channel: MeterChannel; type: 'actual' | 'estimated'; usageWh: Wh };

/** A billed line of a component of the plan, signed as printed: credits negative. `kind` parts a bank's credit from its true-up. */
export type BilledLine = {
  component: string;
  kind: string;
  quantity: string | null;
  unit: string | null;
  amountCents: Cents;
};

/** A billed bank, or one of its periods, in its unit; what is not printed is null. */
export type BilledBank = {
  bank: string;
  period: string | null;
  open: string | null;
  earned: string | null;
  used: string | null;
  expired: string | null;
  paid: string | null;
  close: string | null;
};

/** What was billed. Null is not known, and then not compared. `amountDueCents` is what the plan's own lines come to. */
export type BilledCycle = {
  days: number | null;
  reads: readonly BilledRead[];
  importWh: Wh | null;
  exportWh: Wh | null;
  productionWh: Wh | null;
  lines: readonly BilledLine[] | null;
  banks: readonly BilledBank[];
  /** Paid apart, positive to the customer; null where nothing says what was. */
  payouts: readonly { component: string; amountCents: Cents }[] | null;
  amountDueCents: Cents | null;
};

/** A cycle: the plan in force, what the meters truly saw (`reads` where they are known), and what was billed. */
export type CauseCycle = {
  plan: RatePlan;
  usage: CycleUsage;
  reads: readonly TrueRead[];
  billed: BilledCycle;
};

/** Consecutive cycles; `opening` is what the statement before the first of them closed with. */
export type CauseInput = { opening: Opening; cycles: readonly CauseCycle[] };

/** What a bank, or one of its periods, lacks at the last close, in its unit; negative: it holds too much. */
export type BankShort = { bank: string; period: string | null; unit: 'kWh' | 'USD'; short: string };

/** A mistake that, made alone, gives exactly what was billed. */
export type Cause = {
  cause: CauseId;
  /** One sentence to the owner. */
  words: string;
  /** The same mistake made in another way that gives the same cents; mostly none. */
  alsoWords: string[];
  /** The cycles in which it was made. */
  cycles: { from: Day; to: Day }[];
  /** Too much over all cycles given, payouts withheld included; negative: too little. */
  overbilledCents: Cents;
  bankShort: BankShort[];
  /** What the trial found: which item, rate, factor, days … as plain text. */
  found: Record<string, string>;
};
