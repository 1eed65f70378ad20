import { readFileSync } from 'node:fs';
import { basename } from 'node:path';
import { fileURLToPath } from 'node:url';
import * as z from 'zod/mini';
import { creditYearBody } from '#shared/api/credit.ts';
import { costBody, loanPaymentBody, receiptBody } from '#shared/api/money.ts';
import { addPersonBody } from '#shared/api/people.ts';
import {
  beforeBody,
  cashBody,
  creditBody,
  houseBody,
  incentiveBody,
  loanBody,
  mortgageBody,
  planBody,
  roofBody,
} from '#shared/api/setup.ts';
import { intervalChannel } from '#shared/facts/papers.ts';
import { daySchema } from '#shared/units/day.ts';

const person = z.pick(addPersonBody, { name: true, email: true });

/** `fixtures/sample/household.json`: what the sample's owner typed, in the shapes of the requests that take it, and which papers they logged. */
export const sampleHousehold = z.strictObject({
  people: z.strictObject({ owner: person, member: person, preparer: person }),
  house: houseBody,
  roof: roofBody,
  plan: planBody,
  before: beforeBody,
  loan: loanBody,
  mortgage: mortgageBody,
  credit: creditBody,
  incentive: incentiveBody,
  cash: cashBody,
  money: z.strictObject({
    loanPayments: z.array(loanPaymentBody),
    receipts: z.array(receiptBody),
    costs: z.array(costBody),
  }),
  creditYears: z.array(z.extend(creditYearBody, { taxYear: z.int() })),
  papers: z.strictObject({
    /** What the tax preparer finds behind the credit. */
    credit: z.array(z.string()),
    statements: z.array(z.string()),
    readings: z.array(z.strictObject({ path: z.string(), channel: intervalChannel })),
  }),
  /** A difference the owner has looked at and lets stand. */
  accepted: z.strictObject({ cycleTo: daySchema, note: z.string() }),
});
export type SampleHousehold = z.infer<typeof sampleHousehold>;

const FOLDER = new URL('../../fixtures/sample/', import.meta.url);

export function readSampleHousehold(): SampleHousehold {
  return sampleHousehold.parse(JSON.parse(readFileSync(new URL('household.json', FOLDER), 'utf8')));
}

/** A paper of the sample as a person would upload it. */
export function readSampleFile(path: string): { fileName: string; bytes: Uint8Array } {
  const file = fileURLToPath(new URL(path, FOLDER));
  return { fileName: basename(uploadName(path)), bytes: new Uint8Array(readFileSync(file)) };
}

/** "statements/2025.csv" would say little on a list of documents. */
function uploadName(path: string): string {
  return path.replace(/^statements\/(\d{4})/, 'statements/harrow-bay-$1');
}
