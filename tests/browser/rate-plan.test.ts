import { readFileSync } from 'node:fs';
import type { Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SetupView } from '#shared/api/setup.ts';
import { ratePlanSchema } from '#shared/settlement/plan.ts';
import { samePlan } from '#src/ui/plan-form/same-plan.ts';
import {
  closeBrowser,
  PHONE,
  type RunningServer,
  shot,
  startProduct,
  type Visit,
  visit,
  widthOverflow,
} from '#tests/support/browser.ts';

/** What the owner holds in her hand, and what it says in the plan's language. */
const SHEET = readFileSync('fixtures/plans/evening-peak.txt', 'utf8');
const PLAN = ratePlanSchema.parse(JSON.parse(readFileSync('fixtures/plans/evening-peak.json', 'utf8')));

let server: RunningServer;
let visitor: Visit;
let base: string;

beforeAll(async () => {
  server = await startProduct('never');
  visitor = await visit(server.address);
});
afterAll(async () => {
  await visitor?.close();
  await closeBrowser();
  await server?.stop();
});

const DAYS = Array.from({ length: 30 }, (_, at) => new Date(Date.UTC(2026, 6, 8 + at)).toISOString().slice(0, 10));

/** kWh of each hour of a day, the same every day: bought mostly in the evening, sent out around noon. */
const BOUGHT = (hour: number) => (hour < 7 ? '0.4' : hour < 15 ? '0.1' : hour < 20 ? '0.9' : '0.7');
const SENT = (hour: number) => (hour < 8 ? '0' : hour < 15 ? '1.5' : hour < 17 ? '0.6' : '0');

function hourly(title: string, kwh: (hour: number) => string): string {
  const rows = DAYS.flatMap((day) =>
    Array.from({ length: 24 }, (_, hour) => `${day} ${String(hour).padStart(2, '0')}:00,${kwh(hour)}`),
  );
  return [`Start,${title} (kWh)`, ...rows].join('\n');
}

/*
 * 8 July to 7 August 2026: 30 days, 22 of them weekdays, all in summer. A day: 10.9 kWh bought, 4.5 of them from 3 to 8 pm; 11.7 sent out,
 * 1.2 of them from 3 to 8 pm. On-peak 22 × 4.5 = 99 kWh bought and 22 × 1.2 = 26.4 sent out; off-peak 327 − 99 = 228 and 351 − 26.4 = 324.6.
 * By the sheet: 99 × 0.3480 = 34.45; 228 × 0.1420 = 32.38; 30 × 0.42 = 12.60; 327 × 0.0064 = 2.09; credit 2.90 + 17.85 = 20.75;
 * 2.5 % of 60.77 = 1.52; due 62.29. The bill prices off-peak at winter's 0.1560: 35.57, so 2.5 % of 63.96 = 1.60 and 65.56 due.
 */
const STATEMENT = [
  'service_from,service_to,record,item,label,amount,quantity,unit,rate,in_due,meter,previous,current,statement_date,due_date,days',
  '2026-07-08,2026-08-07,statement,,,,,,,,,,,2026-08-10,2026-08-31,30',
  '2026-07-08,2026-08-07,read,import,,,327,kWh,,,M7,5000,5327,,,',
  '2026-07-08,2026-08-07,read,export,,,351,kWh,,,M7,100,451,,,',
  '2026-07-08,2026-08-07,line,energy charge,"Energy charge, on-peak",34.45,99,kWh,0.3480,yes,,,,,,',
  '2026-07-08,2026-08-07,line,energy charge,"Energy charge, off-peak",35.57,228,kWh,0.1560,yes,,,,,,',
  '2026-07-08,2026-08-07,line,customer charge,Customer charge,12.60,30,day,0.42,yes,,,,,,',
  '2026-07-08,2026-08-07,line,public purpose,Public purpose charge,2.09,327,kWh,0.0064,yes,,,,,,',
  '2026-07-08,2026-08-07,line,export credit,"Export credit, on-peak",-2.90,26.4,kWh,0.1100,no,,,,,,',
  '2026-07-08,2026-08-07,line,export credit,"Export credit, off-peak",-17.85,324.6,kWh,0.0550,no,,,,,,',
  '2026-07-08,2026-08-07,line,credit,Credit applied,-20.75,,,,yes,,,,,,',
  '2026-07-08,2026-08-07,line,franchise fee,Franchise fee,1.60,63.96,USD,0.025,yes,,,,,,',
  '2026-07-08,2026-08-07,balance,amount due,,65.56,,,,,,,,,,',
].join('\n');

async function openFold(page: Page, title: string): Promise<Locator> {
  const fold = page
    .locator('details')
    .filter({ has: page.locator('summary', { hasText: title }) })
    .last();
  if ((await fold.getAttribute('open')) === null) await fold.locator('summary').first().click();
  return fold;
}

async function yearlyDay(part: Locator, label: string, month: string, day: string): Promise<void> {
  await part.getByLabel(`${label}, month`).selectOption({ label: month });
  await part.getByLabel(`${label}, day`).selectOption(day);
}

describe('a time-of-use plan from a printed rate sheet', () => {
  it('is entered in the sheet’s own words and order', async () => {
    expect(SHEET).toContain('Off-peak                       $0.1420       $0.1560');
    const { page } = visitor;
    await page.goto('/sign-up');
    await page.getByLabel('Your name').fill('Tamsin Rook');
    await page.getByLabel('E-mail').fill('tamsin@example.org');
    await page.getByLabel('Password', { exact: true }).fill('nine herons on the mudflat');
    await page.locator('button[type=submit]').click();
    await page.waitForURL('**/start');
    await page.getByLabel('Name of the household').fill('3 Dunlin Steps');
    await page.getByLabel('Time zone').selectOption('America/Los_Angeles');
    await page.locator('button[type=submit]').click();
    await page.waitForURL(/\/h\/[^/]+\/setup/);
    base = page.url().replace(/\/setup.*$/, '');
    await page.goto(base);
    await page.getByRole('link', { name: 'Rate plan' }).first().click();
    await page.getByText('No rate plan yet.').waitFor();
    await shot(page, 'rate-plan-first');
    await page.getByRole('button', { name: 'Enter the plan' }).click();

    await page.getByLabel('Holds from').fill('2026-01-01');
    await page.getByLabel('Its name, as the rate sheet says').fill('R-7 Residential time of day');

    const seasons = await openFold(page, 'Seasons');
    await seasons.getByRole('button', { name: 'Prices differ by season' }).click();
    const summer = seasons.getByRole('group', { name: /Season 1/ });
    await yearlyDay(summer, 'First day', 'May', '15');
    await yearlyDay(summer, 'Last day', 'October', '15');
    const winter = seasons.getByRole('group', { name: /Season 2/ });
    await yearlyDay(winter, 'First day', 'October', '16');
    await yearlyDay(winter, 'Last day', 'May', '14');

    const times = await openFold(page, 'Times of day');
    await times.getByRole('button', { name: 'Prices differ by time of day' }).click();
    const peak = times.getByRole('group', { name: /Period 1/ });
    await peak.getByLabel('From').selectOption({ label: '3 pm' });
    await peak.getByLabel('Until').selectOption({ label: '8 pm' });
    await times.getByLabel('Holidays').fill('2026-07-03\n2026-09-07');

    await page.getByLabel(/A charge on every kWh bought, whatever you send out/).check();
    await page.getByLabel('A tax or franchise fee in percent').check();
    const NAME = 'Name, as the bill prints it';
    await (await openFold(page, 'Energy')).getByLabel(NAME).fill('Energy charge');
    await (await openFold(page, 'Customer charge')).getByLabel('by the day').check();
    await (await openFold(page, 'Public benefits')).getByLabel(NAME).fill('Public purpose charge');
    await (await openFold(page, 'Tax')).getByLabel(NAME).fill('Franchise fee');

    await page.getByLabel(/Every kWh sent out earns a price in dollars/).check();
    await (await openFold(page, 'Export credit')).getByLabel('Its price differs by time of day').check();
    await page.getByRole('button', { name: 'It lapses or is paid out' }).click();
    await page.getByLabel('With the bill that ends in').selectOption({ label: 'April' });

    const energy = page.getByRole('group', { name: 'Energy charge', exact: true });
    await energy.getByLabel('Summer, On-peak').fill('0.3480');
    await energy.getByLabel('Winter, On-peak').fill('0.2260');
    await energy.getByLabel('Summer, Off-peak').fill('0.1420');
    // Nothing is worked out while a price is missing, and nothing is saved.
    await page.getByText(/fields are still to be filled in/).waitFor();
    await page.getByRole('button', { name: 'Save this plan' }).click();
    await page.getByRole('alert').getByText('Write the price of a kWh, such as 0.1684.').waitFor();
    await shot(page, 'rate-plan-missing');
    await energy.getByLabel('Winter, Off-peak').fill('0.1560');
    await page.getByRole('textbox', { name: 'Customer charge', exact: true }).fill('0.42');
    await page.getByRole('textbox', { name: 'Public purpose charge', exact: true }).fill('0.0064');
    await page.getByRole('textbox', { name: 'Franchise fee', exact: true }).fill('2.5');
    const credit = page.getByRole('group', { name: 'Export credit', exact: true });
    await credit.getByLabel('On-peak', { exact: true }).fill('0.11');
    await credit.getByLabel('Off-peak', { exact: true }).fill('0.055');
  });

  it('works a month beside the form, and saves what the sheet says', async () => {
    const { page } = visitor;
    const example = page.getByRole('complementary', { name: 'An example month' });
    await example.getByText(/A made-up month/).waitFor();
    await example.getByText(/shared evenly over the periods/).waitFor();
    // 600 kWh shared evenly: 300 on-peak and 300 off-peak.
    await example.getByText(/300 kWh × \$0\.(348|226)/).waitFor();
    await shot(page, 'rate-plan-filled');
    await page.setViewportSize(PHONE);
    expect(await widthOverflow(page)).toBeLessThanOrEqual(0);
    await shot(page, 'rate-plan-filled-phone');
    await page.setViewportSize({ width: 1280, height: 900 });
    await page.getByRole('button', { name: 'Save this plan' }).click();
    await page.getByText(/You are on/).waitFor();
    await page.getByRole('heading', { name: 'Plans and prices by date' }).waitFor();
    await shot(page, 'rate-plan-saved');
    const answer = await page.request.get(`/api/households/${base.split('/h/')[1]}/setup`);
    const saved = ((await answer.json()) as SetupView).plans;
    expect(saved).toHaveLength(1);
    expect(saved[0]?.from).toBe('2026-01-01');
    const plan = ratePlanSchema.parse(saved[0]?.plan);
    if (!samePlan(plan, PLAN)) expect(plan).toEqual(PLAN);
  });

  it('finds the period that was priced at the other season’s rate', async () => {
    const { page } = visitor;
    await page.goto(`${base}/log`);
    const files = page.locator('input[type=file]');
    const csv = (name: string, text: string) => ({ name, mimeType: 'text/csv', buffer: Buffer.from(text) });
    await files.nth(0).setInputFiles(csv('august.csv', STATEMENT));
    await page.getByText('august.csv').first().waitFor();
    for (const [channel, name, text] of [
      ['import', 'hours-bought.csv', hourly('Delivered', BOUGHT)],
      ['export', 'hours-sent.csv', hourly('Returned', SENT)],
    ] as const) {
      await page.getByLabel('What the file measures').selectOption(channel);
      await files.nth(1).setInputFiles(csv(name, text));
      await page.getByText(name).first().waitFor();
    }
    await page.getByRole('button', { name: 'Check what was read' }).click();
    await page.getByRole('button', { name: 'Post August' }).waitFor();
    await page.getByRole('button', { name: 'Post August' }).click();
    await page
      .getByRole('heading', { level: 1 })
      .filter({ hasText: /August added|took/i })
      .waitFor();
    await page.goto(`${base}/cycles/2026-08-07`);
    await page.getByRole('heading', { level: 1 }).waitFor();
    const row = page.getByRole('row').filter({ hasText: 'Energy charge, off-peak' });
    await row.first().waitFor();
    const text = (await row.first().textContent()) ?? '';
    expect(text).toContain('$35.57');
    expect(text).toContain('$32.38');
    const onPeak =
      (await page.getByRole('row').filter({ hasText: 'Energy charge, on-peak' }).first().textContent()) ?? '';
    expect(onPeak.split('$34.45')).toHaveLength(3);
    await page.getByText('$62.29').first().waitFor();
    // The cause is found by settling again, and named in the sheet's words.
    await page
      .getByText(/winter rate for Off-peak, \$0\.1560, instead of the summer rate, \$0\.1420/)
      .first()
      .waitFor();
    await shot(page, 'rate-plan-cycle');
    expect(visitor.complaints).toEqual([]);
  });

  it('is tried on the cycle against a plan without times of day', async () => {
    const { page } = visitor;
    await page.goto(`${base}/plan`);
    await page.getByRole('heading', { name: 'What would last year have cost on this plan?' }).waitFor();
    const flat = {
      ...PLAN,
      name: 'R-1 Flat',
      calendar: { seasons: [], periods: [], holidays: null },
      charges: PLAN.charges.map((charge) =>
        charge.id === 'energy' ? { ...charge, rates: [{ from: '2026-01-01', rate: '0.20' }] } : charge,
      ),
      credits: PLAN.credits.map((credit) => ({ ...credit, rates: [{ from: '2026-01-01', rate: '0.06' }] })),
    };
    await page.getByLabel('The plan as JSON').fill(JSON.stringify(flat));
    await page.getByRole('button', { name: 'Try it' }).click();
    // 327 × 0.20 = 65.40; + 12.60 + 2.09 − 351 × 0.06 = 21.06 → 59.03; 2.5 % → 1.48; due 60.51, 1.78 less than 62.29.
    await page.getByText('This cycle would have cost $2 less on this plan: $60.51 instead of $62.29.').waitFor();
    await shot(page, 'rate-plan-trial');
    await page.setViewportSize(PHONE);
    expect(await widthOverflow(page)).toBeLessThanOrEqual(0);
    await shot(page, 'rate-plan-trial-phone');
    expect(visitor.complaints).toEqual([]);
  });

  it('takes a later plan in from a file, says why a broken one is refused, and removes it again', async () => {
    const { page } = visitor;
    await page.setViewportSize({ width: 1280, height: 900 });
    const file = page.getByLabel('A plan as a JSON file');
    const give = (name: string, text: string) =>
      file.setInputFiles({ name, mimeType: 'application/json', buffer: Buffer.from(text) });
    await give('torn.json', '{"name": "Torn');
    await page.getByLabel('Holds from').fill('2026-10-01');
    await page.getByRole('button', { name: 'Save this plan' }).click();
    await page
      .getByRole('alert')
      .getByText(/This is not JSON/)
      .waitFor();
    await page.getByRole('button', { name: 'Leave it as it was' }).click();

    const broken = { ...PLAN, banks: PLAN.banks.map((bank) => ({ ...bank, offsets: ['heat'] })) };
    await give('broken.json', JSON.stringify(broken));
    await page.getByLabel('Holds from').fill('2026-10-01');
    await page.getByRole('complementary').getByText(/heat/).first().waitFor();
    await page.getByRole('button', { name: 'Save this plan' }).click();
    await page.getByRole('alert').getByText(/heat/).first().waitFor();
    await shot(page, 'rate-plan-refused');
    await page.getByRole('button', { name: 'Leave it as it was' }).click();

    await give('later.json', JSON.stringify({ ...PLAN, name: 'R-7 as of autumn' }));
    await page.getByLabel('Holds from').fill('2026-10-01');
    await page.getByRole('button', { name: 'Save this plan' }).click();
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'R-7 as of autumn' }).waitFor();
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: /Save as JSON.*autumn/ }).click(),
    ]);
    expect(download.suggestedFilename()).toBe('r-7-as-of-autumn-2026-10-01.json');
    await page.getByRole('button', { name: /Remove.*autumn/ }).click();
    await page.getByRole('dialog').getByRole('button', { name: 'Remove it' }).click();
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'R-7 Residential time of day' }).waitFor();
    expect(visitor.complaints).toEqual([]);
  });
});
