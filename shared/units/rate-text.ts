import * as z from 'zod/mini';

/** An exact decimal as text: a rate in USD per kWh, kW, cycle or day; a percent as a fraction; or kWh. No arithmetic lives here. */
export type DecimalText = string;

export const decimalText = z
  .string()
  .check(z.regex(/^-?\d{1,12}(\.\d{1,12})?$/, { error: 'Use a plain number such as 0.1684.' }));
