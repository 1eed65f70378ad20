import * as z from 'zod/mini';
import {
  creditSchema,
  incentiveSchema,
  loanSchema,
  loanTerms,
  mortgageSchema,
  mortgageTerms,
} from '../facts/finance.ts';
import { costSchema, houseSchema, usageBeforeSchema } from '../facts/house.ts';
import { assumptionsSchema, planInForce } from '../facts/household.ts';
import { openingSchema } from '../settlement/settlement.ts';
import { endpoint, HOUSEHOLD, OWNER } from './endpoint.ts';

/** The steps of the guided set-up, in order. Each can be skipped and taken up later. */
export const setupStep = z.enum(['house', 'roof', 'plan', 'before', 'loan', 'mortgage', 'credit', 'incentive', 'cash']);
export type SetupStep = z.infer<typeof setupStep>;
export const SETUP_STEPS = setupStep.options;

export const stepState = z.object({ step: setupStep, state: z.enum(['open', 'done', 'skipped']) });

export const houseBody = z.strictObject({
  name: houseSchema.shape.name,
  place: houseSchema.shape.place,
  utility: houseSchema.shape.utility,
  timeZone: houseSchema.shape.timeZone,
  latitude: houseSchema.shape.latitude,
  longitude: houseSchema.shape.longitude,
  switchOn: houseSchema.shape.switchOn,
});
export const roofBody = z.strictObject({
  arrays: houseSchema.shape.arrays,
  inverterAcWatts: houseSchema.shape.inverterAcWatts,
  expectedMonthlyWh: houseSchema.shape.expectedMonthlyWh,
  meters: houseSchema.shape.meters,
  aggregation: houseSchema.shape.aggregation,
});
export const planBody = z.strictObject({ plans: z.array(planInForce), opening: openingSchema });
export const beforeBody = z.strictObject({ usageBefore: z.array(usageBeforeSchema) });
/** Null takes the book away. Recorded payments and the rest of the contract are kept; they are entered on the Money screen. */
export const loanBody = z.strictObject({ loan: z.nullable(loanTerms) });
export const mortgageBody = z.strictObject({ mortgage: z.nullable(mortgageTerms) });
export const creditBody = z.strictObject({
  credit: z.nullable(z.omit(creditSchema, { years: true, carriedIn: true })),
});
export const incentiveBody = z.strictObject({ incentive: z.nullable(z.omit(incentiveSchema, { received: true })) });
/** Cash at signing and permits; replaces the rows of those kinds. */
export const cashBody = z.strictObject({
  costs: z.array(costSchema),
  upkeepYearlyCents: assumptionsSchema.shape.upkeepYearlyCents,
});

export const setupView = z.object({
  steps: z.array(stepState),
  house: houseSchema,
  plans: z.array(planInForce),
  opening: openingSchema,
  usageBefore: z.array(usageBeforeSchema),
  loan: z.nullable(loanSchema),
  mortgage: z.nullable(mortgageSchema),
  credit: z.nullable(creditSchema),
  incentive: z.nullable(incentiveSchema),
  costs: z.array(costSchema),
  assumptions: assumptionsSchema,
  /** modules × watts over all arrays, in watts DC. */
  dcWatts: z.int(),
});
export type SetupView = z.infer<typeof setupView>;

const at = '/api/households/:householdId/setup';
export const createHouseholdBody = z.strictObject({
  name: houseSchema.shape.name,
  timeZone: houseSchema.shape.timeZone,
});

export const setupApi = {
  create: endpoint({
    method: 'POST',
    path: '/api/households',
    access: 'signedIn',
    body: createHouseholdBody,
    response: z.object({ id: z.string() }),
  }),
  view: endpoint({ method: 'GET', path: at, access: HOUSEHOLD, response: setupView }),
  house: endpoint({ method: 'PUT', path: `${at}/house`, access: OWNER, body: houseBody, response: setupView }),
  roof: endpoint({ method: 'PUT', path: `${at}/roof`, access: OWNER, body: roofBody, response: setupView }),
  plan: endpoint({ method: 'PUT', path: `${at}/plan`, access: OWNER, body: planBody, response: setupView }),
  before: endpoint({ method: 'PUT', path: `${at}/before`, access: OWNER, body: beforeBody, response: setupView }),
  loan: endpoint({ method: 'PUT', path: `${at}/loan`, access: OWNER, body: loanBody, response: setupView }),
  mortgage: endpoint({ method: 'PUT', path: `${at}/mortgage`, access: OWNER, body: mortgageBody, response: setupView }),
  credit: endpoint({ method: 'PUT', path: `${at}/credit`, access: OWNER, body: creditBody, response: setupView }),
  incentive: endpoint({
    method: 'PUT',
    path: `${at}/incentive`,
    access: OWNER,
    body: incentiveBody,
    response: setupView,
  }),
  cash: endpoint({ method: 'PUT', path: `${at}/cash`, access: OWNER, body: cashBody, response: setupView }),
  skip: endpoint({
    method: 'POST',
    path: `${at}/skip`,
    access: OWNER,
    body: z.strictObject({ step: setupStep }),
    response: setupView,
  }),
};
