import { execFileSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  closeBrowser,
  DESK,
  PHONE,
  type RunningServer,
  type SampleSignIn,
  shot,
  signIn,
  startProduct,
  type Visit,
  visit,
  widthOverflow,
} from '#tests/support/browser.ts';

const AXE = readFileSync('node_modules/axe-core/axe.min.js', 'utf8');
const NEXT = 'fixtures/sample/next';
let server: RunningServer;

beforeAll(async () => {
  server = await startProduct('always');
});
afterAll(async () => {
  await closeBrowser();
  await server?.stop();
});

function person(role: SampleSignIn['role']): SampleSignIn {
  const found = server.signIns.find((one) => one.role === role);
  if (!found) throw new Error(`the server printed no sign-in for the ${role}:\n${server.output()}`);
  return found;
}

async function enter(role: SampleSignIn['role'], size = DESK): Promise<Visit & { base: string }> {
  const visitor = await visit(server.address, size);
  await signIn(visitor.page, person(role));
  const id = /\/h\/([^/]+)/.exec(visitor.page.url())?.[1] ?? '';
  return { ...visitor, base: `/h/${id}` };
}

/** What axe finds on the page as it stands, target size included. */
async function barriers(visitor: Visit): Promise<string[]> {
  // The policy of the page allows no foreign script; the test's own comes in through the debugger.
  return visitor.page.evaluate(`(async () => {
    ${AXE}
    const found = await axe.run(document, { rules: { 'target-size': { enabled: true } } });
    return found.violations.map((one) => one.id + ': ' + one.nodes.map((node) => node.target.join(' ')).join(', '));
  })()`);
}

const SCREENS: [name: string, path: string][] = [
  ['position', ''],
  ['cycles', '/cycles'],
  ['cycle', '/cycles/2026-09-14'],
  ['cycle-exchange', '/cycles/2025-10-14'],
  ['cycle-estimated', '/cycles/2025-01-14'],
  ['cycle-rate-change', '/cycles/2026-06-15'],
  ['money', '/money'],
  ['credit', '/credit'],
  ['setup', '/setup'],
  ['setup-roof', '/setup/roof'],
  ['setup-plan', '/setup/plan'],
  ['setup-mortgage', '/setup/mortgage'],
  ['plan', '/plan'],
  ['people', '/people'],
  ['account', '/account'],
  ['log', '/log'],
];

describe('the screens of the sample household', () => {
  for (const [sizeName, size] of [
    ['desk', DESK],
    ['phone', PHONE],
  ] as const) {
    it(`stand without sideways scrolling, complaints or barriers at ${size.width} px`, async () => {
      const visitor = await enter('owner', size);
      const found: string[] = [];
      for (const [name, path] of SCREENS) {
        await visitor.page.goto(visitor.base + path);
        await visitor.page.getByRole('heading', { level: 1 }).waitFor();
        await visitor.page.waitForLoadState('networkidle');
        const over = await widthOverflow(visitor.page);
        if (over > 0) found.push(`${name}: ${over} px too wide`);
        for (const barrier of await barriers(visitor)) found.push(`${name}: ${barrier}`);
        await shot(visitor.page, `${name}-${sizeName}`);
      }
      expect(found).toEqual([]);
      expect(visitor.complaints).toEqual([]);
      await visitor.close();
    });
  }

  it('show the same position on the screen and in the figures behind it', async () => {
    const visitor = await enter('owner');
    const view = await visitor.page.evaluate(
      async (base) => (await fetch(`/api/households/${base.slice(3)}/position`)).json(),
      visitor.base,
    );
    const settled: number = view.position.settledToday.amountCents;
    const text = `${settled < 0 ? '\u2212' : ''}$${Math.floor(Math.abs(settled) / 100).toLocaleString('en-US')}.${String(Math.abs(settled) % 100).padStart(2, '0')}`;
    await visitor.page.getByText(text).first().waitFor();
    await visitor.page.getByRole('button', { name: text }).first().click();
    await visitor.page.getByRole('dialog').waitFor();
    await shot(visitor.page, 'position-working');
    await visitor.page.keyboard.press('Escape');
    await visitor.close();
  });
});

describe('the owner of the sample logs a month', () => {
  it('posts the next statement with its readings and sees the position move', async () => {
    const { page, base, complaints, close } = await enter('owner');
    const before = await page.getByRole('heading', { level: 1 }).textContent();
    await page.goto(`${base}/log`);
    const files = page.locator('input[type=file]');
    await files.nth(0).setInputFiles(`${NEXT}/statement.csv`);
    await page.getByText('statement.csv').first().waitFor();
    await files.nth(1).setInputFiles(`${NEXT}/production.csv`);
    await page.getByText('production.csv').first().waitFor();
    for (const [channel, file] of [
      ['import', 'intervals-import.csv'],
      ['export', 'intervals-export.csv'],
      ['monitor', 'monitor.csv'],
    ] as const) {
      await page.getByLabel('What the file measures').selectOption(channel);
      await files.nth(1).setInputFiles(`${NEXT}/${file}`);
      await page.getByText(file).first().waitFor();
    }
    await shot(page, 'sample-log-papers');
    await page.getByRole('button', { name: 'Check what was read' }).click();
    await page.getByRole('button', { name: 'Post November' }).waitFor();
    await shot(page, 'sample-log-check');
    await page.setViewportSize(PHONE);
    expect(await widthOverflow(page)).toBeLessThanOrEqual(0);
    await shot(page, 'sample-log-check-phone');
    await page.setViewportSize(DESK);
    await page.getByRole('button', { name: 'Post November' }).click();
    await page
      .getByRole('heading', { level: 1 })
      .filter({ hasText: /November/ })
      .waitFor();
    await shot(page, 'sample-log-posted');
    await page.goto(base);
    await page.getByText(/counted to 13 November/).waitFor();
    expect(await page.getByRole('heading', { level: 1 }).textContent()).not.toBe(before);
    expect(complaints).toEqual([]);
    await close();
  });

  it('is told that the same file is here already, and nothing changes', async () => {
    const { page, base, close } = await enter('owner');
    await page.goto(`${base}/log`);
    await page.locator('input[type=file]').nth(0).setInputFiles(`${NEXT}/statement.csv`);
    await page
      .getByText(/already/)
      .first()
      .waitFor();
    await shot(page, 'same-file-twice');
    const rows = await page.evaluate(async (at) => (await fetch(`/api/households/${at.slice(3)}/cycles`)).json(), base);
    expect(rows.rows).toHaveLength(27);
    await close();
  });

  it('accepts the short export with a note, and takes that back', async () => {
    const { page, base, close } = await enter('owner');
    await page.goto(`${base}/cycles/2026-09-14`);
    await page
      .getByRole('button', { name: /accept with a note/i })
      .first()
      .click();
    await page.getByRole('dialog').getByRole('textbox').fill('The utility said it will credit 44 kWh next month.');
    await shot(page, 'cycle-accept');
    await page.getByRole('dialog').locator('button[type=submit]').click();
    await page.getByText('The utility said it will credit 44 kWh next month.').first().waitFor();
    await shot(page, 'cycle-accepted');
    await close();
  });
});

describe('a correction of a posted statement', () => {
  it('is a new revision with a reason; the earlier one stays readable', async () => {
    const { page, base, close } = await enter('owner');
    await page.goto(`${base}/cycles/2026-05-14`);
    await page.getByRole('button', { name: 'Correct the statement' }).click();
    await page.getByLabel('Statement date').fill('2026-05-20');
    await page.getByLabel('Reason').fill('The date was read from the envelope.');
    await shot(page, 'cycle-correct');
    await page.locator('form button[type=submit]').click();
    await page
      .getByText(/revision 2/)
      .first()
      .waitFor();
    await page.getByText('One earlier revision').click();
    await page.getByText(/The date was read from the envelope/).waitFor();
    await shot(page, 'cycle-corrected');
    await close();
  });
});

describe('a bad file', () => {
  it('gets an error that names file, row and column; good rows stay only if the owner says so', async () => {
    const { page, base, close } = await enter('owner');
    await page.goto(`${base}/log`);
    const good = readFileSync('fixtures/statements/gablebook-csv/plain-month.csv', 'utf8');
    const bad = readFileSync('fixtures/statements/gablebook-csv/bad-amount.csv', 'utf8');
    expect(bad).not.toBe(good);
    const files = page.locator('input[type=file]');
    await files.nth(0).setInputFiles({ name: 'bad-amount.csv', mimeType: 'text/csv', buffer: Buffer.from(bad) });
    await page
      .getByText(/Row \d+, amount/i)
      .first()
      .waitFor();
    await shot(page, 'bad-row');
    await page
      .getByRole('button', { name: /keep the/i })
      .first()
      .waitFor();
    await files
      .nth(0)
      .setInputFiles({ name: 'photo.csv', mimeType: 'text/csv', buffer: Buffer.from('PK\u0003\u0004 not a table') });
    await page.getByText(/photo\.csv was not taken in/).waitFor();
    await files.nth(0).setInputFiles({ name: 'empty.csv', mimeType: 'text/csv', buffer: Buffer.alloc(0) });
    await page.getByText(/empty\.csv was not taken in/).waitFor();
    await shot(page, 'bad-files');
    expect(await page.getByText('bad-amount.csv').count()).toBeGreaterThan(0);
    await page.reload();
    await page.getByText('bad-amount.csv').first().waitFor();
    await close();
  });
});

describe('a production file that says too little', () => {
  it('is read again the way the owner says', async () => {
    const { page, base, close } = await enter('owner');
    await page.goto(`${base}/log`);
    // One day of hourly figures without a unit: 2 in each of ten hours.
    const rows = Array.from(
      { length: 24 },
      (_, hour) => `2026-11-20 ${String(hour).padStart(2, '0')}:00,${hour >= 7 && hour < 17 ? 2 : 0}`,
    );
    const buffer = Buffer.from(['time,roof', ...rows].join('\n'));
    await page.getByLabel('What the file measures').selectOption('monitor');
    await page.locator('input[type=file]').nth(1).setInputFiles({ name: 'roof.csv', mimeType: 'text/csv', buffer });
    const sheet = page.locator('section').filter({ hasText: 'roof.csv' }).last();
    await sheet.getByRole('button', { name: /how it is read/ }).click();
    for (const [unit, total] of [
      ['kWh', /^20 kWh$/],
      ['Wh', /^0 kWh$/],
      ['kW', /^20 kWh$/],
    ] as const) {
      const open = sheet.getByRole('button', { name: 'Close' });
      if ((await open.count()) === 0) await sheet.getByRole('button', { name: /how it is read/ }).click();
      await sheet.getByLabel('Unit').selectOption(unit);
      await sheet.getByRole('button', { name: 'Read it again this way' }).click();
      await sheet.locator('b', { hasText: total }).waitFor();
    }
    await shot(page, 'mapping');
    await sheet.getByRole('button', { name: 'Take the file out' }).click();
    await expect.poll(() => page.getByText('roof.csv').count(), { timeout: 15_000 }).toBe(0);
    await close();
  });
});

describe('the full export', () => {
  it('is downloaded on the Account screen, and the command line comes to the position on the screen', async () => {
    const { page, base, close } = await enter('owner');
    await page.goto(`${base}/account`);
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page
        .getByRole('link', { name: /export/i })
        .first()
        .click(),
    ]);
    const printed = execFileSync(process.execPath, ['--import', 'tsx', 'server/cli/ledger.ts', await download.path()], {
      encoding: 'utf8',
      maxBuffer: 64 * 1024 * 1024,
    });
    const view = await page.evaluate(
      async (at) => (await fetch(`/api/households/${at.slice(3)}/position`)).json(),
      base,
    );
    const ledger = JSON.parse(printed);
    expect(ledger.position.settledToday.amountCents).toBe(view.position.settledToday.amountCents);
    expect(ledger.position.cashSoFar.amountCents).toBe(view.position.cashSoFar.amountCents);
    await close();
  });
});

describe('who sees what', () => {
  it('a household member sees the book and changes nothing', async () => {
    const { page, base, close } = await enter('member', PHONE);
    await page.getByRole('heading', { level: 1 }).waitFor();
    expect(await page.getByRole('link', { name: /log (this )?month/i }).count()).toBe(0);
    for (const path of ['/cycles', '/cycles/2026-09-14', '/money', '/credit', '/setup']) {
      await page.goto(base + path);
      await page.getByRole('heading', { level: 1 }).waitFor();
      expect(await page.getByRole('button', { name: /accept|correct|record|add |remove|save/i }).count(), path).toBe(0);
    }
    await page.goto(`${base}/people`);
    expect(await page.getByText('priya@example.org').count()).toBe(0);
    await close();
  });

  it('a tax preparer sees the tax credit, its papers and its export, and is sent back from elsewhere', async () => {
    const { page, base, close } = await enter('preparer');
    await page.waitForURL('**/credit');
    await page.getByRole('heading', { level: 1 }).waitFor();
    await shot(page, 'credit-preparer');
    for (const path of ['', '/cycles', '/money', '/people', '/setup', '/log']) {
      await page.goto(base + path);
      await page.waitForURL('**/credit');
    }
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: /CSV/ }).click(),
    ]);
    const csv = readFileSync(await download.path(), 'utf8');
    expect(csv).toMatch(/2024/);
    expect(csv).toMatch(/11070|11,070/);
    for (const path of ['position', 'cycles', 'money', 'setup', 'people', 'export', 'log']) {
      const status = await page.evaluate(
        async (at) => (await fetch(at)).status,
        `/api/households/${base.slice(3)}/${path}`,
      );
      expect(status, path).toBe(403);
    }
    await close();
  });
});
