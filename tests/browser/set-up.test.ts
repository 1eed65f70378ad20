import { afterAll, beforeAll, describe, expect, it } from 'vitest';
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

let server: RunningServer;
let visitor: Visit;

beforeAll(async () => {
  server = await startProduct('never');
  visitor = await visit(server.address);
});
afterAll(async () => {
  await visitor?.close();
  await closeBrowser();
  await server?.stop();
});

/** A month as a homeowner would fill it into the template: 410 kWh bought at 0.15, 205 sent out at 0.08, a customer charge, 5 % tax. */
const STATEMENT = [
  'service_from,service_to,record,item,label,amount,quantity,unit,rate,in_due,meter,previous,current,statement_date,due_date,days',
  '2026-06-10,2026-07-10,statement,,,,,,,,,,,2026-07-13,2026-08-03,30',
  '2026-06-10,2026-07-10,read,import,,,410,kWh,,,M1,1000,1410,,,',
  '2026-06-10,2026-07-10,read,export,,,205,kWh,,,M1,0,205,,,',
  '2026-06-10,2026-07-10,line,import,Energy,61.50,410,kWh,0.15,yes,,,,,,',
  '2026-06-10,2026-07-10,line,customer charge,Customer charge,12.00,,,,yes,,,,,,',
  '2026-06-10,2026-07-10,line,export credit,Export credit,-16.40,205,kWh,0.08,no,,,,,,',
  '2026-06-10,2026-07-10,line,credit,Credit applied,-16.40,,,,yes,,,,,,',
  '2026-06-10,2026-07-10,line,tax,City tax,2.86,57.10,USD,0.05,yes,,,,,,',
  '2026-06-10,2026-07-10,balance,amount due,,59.96,,,,,,,,,,',
].join('\n');

/** Daily production of the same month: 30 days of 20 kWh. */
const PRODUCTION = [
  'Date,Production (kWh)',
  ...Array.from({ length: 30 }, (_, i) => {
    const day = new Date(Date.UTC(2026, 5, 10 + i)).toISOString().slice(0, 10);
    return `${day},20.000`;
  }),
].join('\n');

describe('from nothing to a posted first month', () => {
  it('signs up, makes a household and skips what can wait', async () => {
    const { page } = visitor;
    await page.goto('/');
    await page.waitForURL('**/sign-in');
    await shot(page, 'sign-in');
    await page
      .getByRole('link', { name: /account|start|sign up|book/i })
      .first()
      .click();
    await page.waitForURL('**/sign-up');
    await shot(page, 'sign-up');
    await page.getByLabel('Your name').fill('Odile Farrow');
    await page.getByLabel('E-mail').fill('odile@example.org');
    await page.getByLabel('Password', { exact: true }).fill('too short');
    await page.locator('button[type=submit]').click();
    await page
      .getByText(/15 characters or more/)
      .first()
      .waitFor();
    await page.getByLabel('Password', { exact: true }).fill('wet slates and warm copper');
    await page.locator('button[type=submit]').click();
    await page.waitForURL('**/start');
    await shot(page, 'start');
    await page.getByLabel('Name of the household').fill('7 Sandpiper Row');
    await page.getByLabel('Time zone').selectOption('America/Los_Angeles');
    await page.locator('button[type=submit]').click();
    await page.waitForURL(/\/h\/[^/]+\/setup/);
    await shot(page, 'setup');
  });

  it('fills in house, roof and rate plan in plain questions', async () => {
    const { page } = visitor;
    const base = page.url().replace(/\/setup.*$/, '');
    await page.goto(`${base}/setup/house`);
    await page.getByLabel('Town').fill('Gull Harbour');
    await page.getByLabel('Electric utility').fill('Sound Ledge Light');
    await page.getByLabel('Switch-on day').fill('2026-06-10');
    await page.getByRole('button', { name: 'Save and go on' }).click();
    await page.waitForURL('**/setup/roof');
    await page.getByLabel('Name', { exact: true }).fill('South');
    await page.getByLabel('Modules').fill('16');
    await page.getByLabel('Watts each').fill('400');
    await page
      .getByText(/6\.40? kW DC/)
      .first()
      .waitFor();
    await shot(page, 'setup-roof');
    await page.getByRole('button', { name: 'Save and go on' }).click();
    await page.waitForURL('**/setup/plan');
    await page.getByLabel('Its name, as the rate sheet says').fill('Residential net billing');
    await page.getByLabel(/Every kWh sent out earns a price in dollars/).check();
    await page.getByLabel('A customer charge, whatever is used').check();
    await page.getByLabel('A tax or franchise fee in percent').check();
    const tax = page.locator('details').filter({ has: page.locator('summary', { hasText: 'Tax' }) });
    await tax.locator('summary').click();
    await tax.getByLabel('Name, as the bill prints it').fill('City tax');
    await page.getByLabel('From', { exact: true }).first().fill('2026-01-01');
    await page.getByLabel('A kWh bought', { exact: true }).fill('0.15');
    await page.getByLabel('A kWh sent out', { exact: true }).fill('0.08');
    await page.getByRole('textbox', { name: 'Customer charge', exact: true }).fill('12.00');
    await page.getByRole('textbox', { name: 'City tax', exact: true }).fill('5');
    await shot(page, 'setup-plan');
    await page.getByRole('button', { name: 'Save and go on' }).click();
    await page.waitForURL('**/setup/before');
    await page.getByRole('button', { name: 'Skip for now' }).click();
    await page.waitForURL('**/setup/loan');
    await page.getByLabel('With a loan for it').check();
    await page.getByLabel('Lender', { exact: true }).fill('Breakwater Credit Union');
    await page.getByLabel('Principal', { exact: true }).fill('21,000.00');
    await page.getByLabel('Rate', { exact: true }).fill('4.99');
    await page.getByLabel('Term', { exact: true }).fill('15');
    await page.getByLabel('Funded on').fill('2026-05-20');
    await page.getByLabel('First payment due').fill('2026-07-01');
    await shot(page, 'setup-loan');
    await page.getByRole('button', { name: 'Save and go on' }).click();
    for (const next of ['mortgage', 'credit', 'incentive', 'cash']) {
      await page.waitForURL(`**/setup/${next}`);
      await shot(page, `setup-${next}`);
      await page.getByRole('button', { name: 'Skip for now' }).click();
    }
    await page.waitForURL('**/setup');
    await expect.poll(() => page.getByText('skipped for now').count(), { timeout: 15_000 }).toBe(5);
    await shot(page, 'setup-after');
  });

  it('sees an empty position that says what to do', async () => {
    const { page } = visitor;
    await page.goto(page.url().replace(/\/setup.*$/, ''));
    await page
      .getByRole('link', { name: /log the first month/i })
      .first()
      .waitFor();
    await shot(page, 'position-empty');
    await page.setViewportSize(PHONE);
    await shot(page, 'position-empty-phone');
    expect(await widthOverflow(page)).toBeLessThanOrEqual(0);
    await page.setViewportSize({ width: 1280, height: 900 });
  });

  it('logs the first month from two files and sees the cycle balanced', async () => {
    const { page, complaints } = visitor;
    const base = page.url();
    await page.goto(`${base}/log`);
    await shot(page, 'log-empty');
    const files = page.locator('input[type=file]');
    await files.nth(0).setInputFiles({ name: 'june.csv', mimeType: 'text/csv', buffer: Buffer.from(STATEMENT) });
    await page.getByText('june.csv').first().waitFor();
    await files.nth(1).setInputFiles({ name: 'roof-june.csv', mimeType: 'text/csv', buffer: Buffer.from(PRODUCTION) });
    await page.getByText('roof-june.csv').first().waitFor();
    await shot(page, 'log-papers');
    await page.getByRole('button', { name: 'Check what was read' }).click();
    await page.getByRole('button', { name: 'Post July' }).waitFor();
    await shot(page, 'log-check');
    await page.getByRole('button', { name: 'Post July' }).click();
    await page
      .getByRole('heading', { level: 1 })
      .filter({ hasText: /July added|took/i })
      .waitFor();
    await shot(page, 'log-posted');
    await page.goto(`${base}/cycles/2026-07-10`);
    await page.getByText('The bill agrees with your meters.').waitFor();
    await shot(page, 'cycle-first');
    // 600 kWh made, 205 sent out, 410 bought: the house used 805 kWh, 395 of them from its own roof.
    await page.getByText(/805/).first().waitFor();
    await page.goto(base);
    await page.getByRole('heading', { level: 1 }).waitFor();
    await shot(page, 'position-first-month');
    expect(complaints).toEqual([]);
  });
});
