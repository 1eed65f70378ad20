import * as z from 'zod/mini';
import { ratePlanSchema } from '../settlement/plan.ts';
import { openingSchema } from '../settlement/settlement.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { decimalText } from '../units/rate-text.ts';
import { creditSchema, incentiveSchema, leaseSchema, loanSchema, mortgageSchema, otherLoanSchema } from './finance.ts';
import { costSchema, houseSchema, usageBeforeSchema } from './house.ts';
import { acceptedDifference, documentSchema, intervalDay, statementSchema } from './papers.ts';
import { scenarioSchema } from './scenario.ts';

/** A plan and the day from which it holds; it starts with the first cycle that begins on or after that day. */
export const planInForce = z.object({
  from: daySchema,
  plan: ratePlanSchema,
  /** The plan the house would have without a roof; null: the same plan with solar-only charges, credits and banks dropped. */
  withoutRoof: z.nullable(ratePlanSchema),
});
export type PlanInForce = z.infer<typeof planInForce>;

/** A published emission factor: pounds of CO₂ per MWh, with where, which basis and which year it is for. */
export const gridFactor = z.object({
  region: z.string().check(z.minLength(1), z.maxLength(80)),
  lbPerMwh: decimalText,
  basis: z.string().check(z.minLength(1), z.maxLength(80)),
  year: z.int(),
});
export type GridFactor = z.infer<typeof gridFactor>;

/** eGRID2022, US total output emission rate: 823.149 lb CO₂/MWh (a table copied from the EPA workbook, read second-hand). */
const US_GRID: GridFactor = { region: 'United States', lbPerMwh: '823.149', basis: 'total output', year: 2022 };

/** What the projection assumes. Every one has a default and a source, and is shown. */
export const assumptionsSchema = z.object({
  /** Yearly loss of production, fraction. */
  degradation: decimalText,
  /** Yearly rise of the utility's prices, fraction. */
  priceRise: decimalText,
  /** Months to project. */
  horizonMonths: z.int().check(z.minimum(12), z.maximum(480)),
  /** Upkeep a year. */
  upkeepYearlyCents: centsSchema.check(z.minimum(0)),
  /** Yearly rate at which money to come is worth less, fraction; for the handbook figures only. */
  discountRate: z._default(decimalText, '0.03'),
  /** Emissions of the grid that a kWh from the roof takes the place of. */
  grid: z._default(gridFactor, US_GRID),
});
export type Assumptions = z.infer<typeof assumptionsSchema>;

/** Everything a household has stated or uploaded: the whole input of the ledger. */
export const householdFacts = z.object({
  house: houseSchema,
  plans: z.array(planInForce),
  /** What the utility's books held before the first cycle. */
  opening: openingSchema,
  loan: z.nullable(loanSchema),
  otherLoans: z._default(z.array(otherLoanSchema), []),
  lease: z._default(z.nullable(leaseSchema), null),
  mortgage: z.nullable(mortgageSchema),
  credit: z.nullable(creditSchema),
  incentive: z.nullable(incentiveSchema),
  costs: z.array(costSchema),
  usageBefore: z.array(usageBeforeSchema),
  documents: z.array(documentSchema),
  /** All revisions, in any order. */
  statements: z.array(statementSchema),
  intervals: z.array(intervalDay),
  accepted: z.array(acceptedDifference),
  assumptions: assumptionsSchema,
  /** Changes tried and kept by name; they touch no figure of the record. */
  scenarios: z._default(z.array(scenarioSchema).check(z.maxLength(20)), []),
});
export type HouseholdFacts = z.infer<typeof householdFacts>;

export const EXPORT_FORMAT = 'gablebook-household';
export const EXPORT_VERSION = 1;

/**
 * The full household export: one documented, versioned JSON value. `npm run --silent ledger -- household.json` reads it and the account page
 * downloads it. Files are kept in `documentBytes` (base64 by document id) so that an export restores to an identical household.
 */
export const householdExport = z.object({
  format: z.literal(EXPORT_FORMAT),
  version: z.literal(EXPORT_VERSION),
  exportedAt: z.string(),
  /** The day the figures are computed for. */
  today: daySchema,
  facts: householdFacts,
  documentBytes: z.record(z.string(), z.string()),
  /** What is no input of the ledger and still must not be lost: how far the set-up got, and rows left out of a file with the reason. */
  record: z.optional(
    z.object({
      steps: z.array(z.object({ step: z.string(), state: z.enum(['open', 'done', 'skipped']) })),
      rejectedRows: z.array(
        z.object({
          documentId: z.string(),
          row: z.nullable(z.int()),
          column: z.nullable(z.string()),
          found: z.nullable(z.string()),
          reason: z.string(),
        }),
      ),
    }),
  ),
});
export type HouseholdExport = z.infer<typeof householdExport>;

/**
 * Defaults of the projection. Degradation: median of about 2,000 published rates, 0.5 % a year (Jordan & Kurtz 2013). Price rise: 2.5 % a year,
 * near the mean rise of the US residential price 2010–2024 (EIA; computed 2.58 %).
 */
export const DEFAULT_ASSUMPTIONS: Assumptions = assumptionsSchema.parse({
  degradation: '0.005',
  priceRise: '0.025',
  horizonMonths: 300,
  upkeepYearlyCents: 0,
});
