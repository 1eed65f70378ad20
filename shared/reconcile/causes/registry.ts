import { bankLost } from './bank-lost.ts';
import { creditOnFixed } from './credit-on-fixed.ts';
import { creditedTwice } from './credited-twice.ts';
import type { Hypothesis } from './edit.ts';
import { estimatedRead } from './estimated-read.ts';
import { excessNotBanked } from './excess-not-banked.ts';
import { exportShort } from './export-short.ts';
import { grossForNet } from './gross-for-net.ts';
import { incentiveOnExport } from './incentive-on-export.ts';
import { meterExchange } from './meter-exchange.ts';
import { nonbypassableOnLoad } from './nonbypassable-on-load.ts';
import { registerRollover } from './register-rollover.ts';
import { registersSwapped } from './registers-swapped.ts';
import { tiersOnGross } from './tiers-on-gross.ts';
import { trueUpEarly } from './true-up-early.ts';
import { wrongDays } from './wrong-days.ts';
import { wrongMultiplier } from './wrong-multiplier.ts';
import { wrongRate } from './wrong-rate.ts';

/** Every mistake that is tried, from the meter to the bill. */
export const HYPOTHESES: readonly Hypothesis[] = [
  registerRollover,
  wrongMultiplier,
  registersSwapped,
  meterExchange,
  estimatedRead,
  wrongDays,
  wrongRate,
  tiersOnGross,
  grossForNet,
  nonbypassableOnLoad,
  incentiveOnExport,
  creditedTwice,
  creditOnFixed,
  bankLost,
  excessNotBanked,
  trueUpEarly,
];

/** Tried only where nothing above explains the bill: they say what differs, not why. */
export const LAST_RESORTS: readonly Hypothesis[] = [exportShort];
