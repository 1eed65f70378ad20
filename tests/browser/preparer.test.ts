import { readFileSync } from 'node:fs';
import type { Download, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeBrowser, type RunningServer, shot, signIn, startProduct, visit } from '#tests/support/browser.ts';
import { pdfTexts } from '#tests/support/pdf-text.ts';

let server: RunningServer;
beforeAll(async () => {
  server = await startProduct('always');
});
afterAll(async () => {
  await closeBrowser();
  await server?.stop();
});

/** The form as it stands on the screen: line number → the figures of its years, as text. */
async function formOnScreen(page: Page): Promise<Map<string, string[]>> {
  const rows = await page.locator('table', { hasText: 'Form 5695, Part I' }).locator('tbody tr').all();
  const form = new Map<string, string[]>();
  for (const row of rows) {
    const [number = '', ...figures] = await row.locator('td').allTextContents();
    if (/^\d/.test(number.trim()))
      form.set(
        number.trim(),
        figures.map((figure) => figure.replace(' expected', '').trim()),
      );
  }
  return form;
}

async function fetched(page: Page, link: RegExp): Promise<{ download: Download; bytes: Buffer }> {
  const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('link', { name: link }).click()]);
  return { download, bytes: readFileSync(await download.path()) };
}

describe('a tax preparer takes the summary', () => {
  it('as PDF and as CSV, and both say what the form lines on the screen say', async () => {
    const preparer = server.signIns.find(({ role }) => role === 'preparer');
    if (!preparer) throw new Error(`no sign-in of a preparer was printed:\n${server.output()}`);
    const { page, complaints, close } = await visit(server.address);
    await signIn(page, preparer);
    await page.waitForURL('**/credit');
    await page.getByRole('heading', { level: 1 }).waitFor();
    const form = await formOnScreen(page);
    expect([...form.keys()]).toEqual(['1', '6b', '12', '13', '14', '15', '16']);
    expect(form.get('15')).toEqual(['4,150', '5,050', '1,870']);

    const csv = await fetched(page, /^CSV$/);
    expect(csv.download.suggestedFilename()).toMatch(/^tax-credit-summary-\d{4}-\d\d-\d\d\.csv$/);
    const rows = csv.bytes
      .toString('utf8')
      .split('\r\n')
      // The words of a line may be quoted; its number and figures never are.
      .map((row) => row.replace(/^"[^"]*"/, 'words').split(','));
    for (const [number, figures] of form) {
      const row = rows.find(([, line]) => line === number);
      expect(row?.slice(2), `line ${number} of the CSV`).toEqual(
        figures.map((figure) => `${figure.replace(',', '')}.00`),
      );
    }

    const pdf = await fetched(page, /PDF/);
    expect(pdf.download.suggestedFilename()).toMatch(/^tax-credit-summary-\d{4}-\d\d-\d\d\.pdf$/);
    const pages = pdfTexts(pdf.bytes);
    expect(pages).toHaveLength(2);
    const [first = []] = pages;
    for (const [number, figures] of form) {
      // The number of the line, its words, then the years from left to right.
      const at = first.indexOf(number);
      expect(first.slice(at + 2, at + 2 + figures.length), `line ${number} of the PDF`).toEqual(figures);
    }
    expect(first).toContain('page 1 of 2');
    expect(pages[1]?.join(' ')).toMatch(/not tax advice/);
    await shot(page, 'preparer-credit');
    expect(complaints).toEqual([]);
    await close();
  });
});
