import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { safeFileName, UPLOAD_LIMIT_BYTES } from '#server/http/upload.ts';
import { creditApi } from '#shared/api/credit.ts';
import { logApi } from '#shared/api/log.ts';
import {
  failOnConsole,
  newHousehold,
  pathOf,
  startTestServer,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

let server: TestServer;
let home: TestHousehold;
beforeAll(async () => {
  server = await startTestServer();
  home = await newHousehold(server);
});
afterAll(() => server.close());

const statement = (fileName: string, bytes: Uint8Array | string) =>
  home.owner.call(logApi.addStatementFile, { params: home.params, file: { fileName, bytes } });
const production = (fileName: string, bytes: Uint8Array | string, channel = 'production') =>
  home.owner.call(logApi.addProductionFile, { params: home.params, file: { fileName, bytes }, fields: { channel } });
const paper = (fileName: string, bytes: Uint8Array | string) =>
  home.owner.call(creditApi.addPaper, { params: home.params, file: { fileName, bytes } });
const held = () => server.deps.sqlite.prepare('SELECT count(*) FROM documents').pluck().get();

const PDF = '%PDF-1.7\n% a paper';
const ZIP = new Uint8Array([0x50, 0x4b, 3, 4, 20, 0, 0, 0, 8, 0]);
const XLS = new Uint8Array([0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1, 0, 0]);

describe('what may be uploaded', () => {
  it.each([
    ['an empty file', 'empty.csv', '', 422, 'file-empty'],
    ['a workbook named CSV', 'bill.csv', ZIP, 415, 'file-wrong-kind'],
    ['an old workbook', 'bill.xls', XLS, 415, 'file-wrong-kind'],
    ['a PDF named CSV', 'bill.csv', PDF, 415, 'file-wrong-kind'],
    ['binary content', 'bill.csv', new Uint8Array([97, 0, 98, 0, 99, 10]), 415, 'file-wrong-kind'],
    [
      'a text that is no statement file',
      'letter.csv',
      'Dear customer,\nthank you for your letter.\n',
      422,
      'file-unreadable',
    ],
  ])('%s is no statement and leaves nothing behind', async (_what, fileName, bytes, status, code) => {
    const before = held();
    const refused = await statement(fileName, bytes);
    expect(refused.problem.code).toBe(code);
    expect(refused.status).toBe(status);
    expect(refused.problem.detail).toMatch(/\w+.*\.$/);
    expect(held()).toBe(before);
  });

  it('a workbook as a production file is refused with the way out', async () => {
    expect((await production('year.xlsx', ZIP)).problem).toMatchObject({ code: 'file-wrong-kind' });
    expect((await production('year.xlsx', ZIP)).problem.detail).toMatch(/CSV/);
  });

  it('a file over 20 MB is too large, whatever it holds, and leaves nothing behind', async () => {
    const before = held();
    const refused = await production('long.csv', new Uint8Array(UPLOAD_LIMIT_BYTES + 1).fill(49));
    expect(refused.status).toBe(413);
    expect(refused.problem.code).toBe('file-too-large');
    expect(held()).toBe(before);
  });

  it('two files, a wrong field, too many fields and a broken form are refused', async () => {
    const path = pathOf(logApi.addStatementFile, home.params);
    const send = (body: FormData | string, headers: Record<string, string> = {}) =>
      home.owner.raw(path, { method: 'POST', body, headers: { 'sec-fetch-site': 'same-origin', ...headers } });
    const two = new FormData();
    two.append('file', new Blob(['a']), 'a.csv');
    two.append('file', new Blob(['b']), 'b.csv');
    const other = new FormData();
    other.append('attachment', new Blob(['a']), 'a.csv');
    const many = new FormData();
    for (let count = 0; count < 12; count += 1) many.append(`f${count}`, 'x');
    for (const form of [two, other, many]) {
      const answer = await send(form);
      expect(answer.status).toBe(400);
      expect(await answer.json()).toMatchObject({ code: 'bad-request' });
    }
    const broken = await send('--x\r\nnonsense', { 'content-type': 'multipart/form-data; boundary=x' });
    expect(broken.status).toBe(400);
    expect((await broken.json()).code).toMatch(/bad-request|file-missing/);
    const json = await send('{}', { 'content-type': 'application/json' });
    expect(await json.json()).toMatchObject({ code: 'file-missing' });
  });

  it('a channel that is none is refused', async () => {
    expect((await production('a.csv', 'Time,Wh\n', 'roof')).problem.code).toBe('bad-request');
  });

  it('papers of the credit are what their ending says', async () => {
    expect((await paper('contract.pdf', PDF)).value.papers.map(({ fileName }) => fileName)).toEqual(['contract.pdf']);
    expect((await paper('contract.pdf', '<html><script>alert(1)</script>')).problem.code).toBe('file-wrong-kind');
    expect((await paper('page.html', '<html></html>')).problem.code).toBe('file-wrong-kind');
    expect((await paper('photo.png', PDF)).problem.code).toBe('file-wrong-kind');
    expect((await paper('again.pdf', PDF)).problem.code).toBe('file-already-here');
  });

  it('a paper comes back as it was, to be saved and never shown', async () => {
    const bytes = `${PDF} of inspection`;
    const { value } = await paper('Abnahme Prüfung – 1.pdf', bytes);
    const stored = value.papers.at(-1);
    expect(stored?.fileName).toBe('Abnahme Prüfung – 1.pdf');
    const answer = await home.owner.call(creditApi.paper, { params: { ...home.params, documentId: stored?.id ?? '' } });
    expect(answer.text).toBe(bytes);
    expect(answer.headers.get('content-disposition')).toBe(
      `attachment; filename="Abnahme Pr_fung _ 1.pdf"; filename*=UTF-8''Abnahme%20Pr%C3%BCfung%20%E2%80%93%201.pdf`,
    );
    expect(answer.headers.get('content-security-policy')).toBe("default-src 'none'; sandbox");
    expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
    expect(answer.headers.get('content-type')).toBe('application/pdf');
    expect(answer.headers.get('cache-control')).toBe('no-store');
  });

  it('the template downloads for anybody and is read without a fault', async () => {
    const template = await server.client().call(logApi.template);
    expect(template.headers.get('content-disposition')).toContain('attachment');
    const read = await statement('template.csv', template.text);
    expect(read.value.files[0]?.faults).toEqual([]);
    expect(read.value.statements).toHaveLength(1);
  });
});

describe('the name a file is kept under', () => {
  it.each([
    ['../../etc/passwd', 'passwd'],
    ['C:\\papers\\bill.pdf', 'bill.pdf'],
    ['a\r\nSet-Cookie: x.csv', 'aSet-Cookie x.csv'],
    ['invoice\u202efdp.exe', 'invoicefdp.exe'],
    ['..', 'file'],
    ['', 'file'],
    ['.hidden', 'hidden'],
    [`${'n'.repeat(300)}.csv`, `${'n'.repeat(116)}.csv`],
  ])('%j becomes %j', (given, kept) => {
    expect(safeFileName(given)).toBe(kept);
  });
});
