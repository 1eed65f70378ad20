import { hypothesis } from './edit.ts';
import { withGross } from './gross-plan.ts';

/** The tiers are run over all imported kWh instead of what is left after netting (net-metering.md §4, "tiers/TOU": tier(N), not tier(I)). */
export const tiersOnGross = hypothesis('tiersOnGross', (place) => withGross(place, true));
