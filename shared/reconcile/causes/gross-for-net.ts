import { hypothesis } from './edit.ts';
import { withGross } from './gross-plan.ts';

/** All imported kWh are billed where the plan nets them with export first. */
export const grossForNet = hypothesis('grossForNet', (place) => withGross(place, false));
