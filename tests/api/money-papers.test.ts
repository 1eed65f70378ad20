import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { UPLOAD_LIMIT_BYTES } from '#server/http/upload.ts';
import { creditApi } from '#shared/api/credit.ts';
import { logApi } from '#shared/api/log.ts';
import { moneyApi } from '#shared/api/money.ts';
import { moneyOtherApi } from '#shared/api/money-other.ts';
import { moneyPapersApi } from '#shared/api/money-papers.ts';
import { positionApi } from '#shared/api/position.ts';
import { setupApi } from '#shared/api/setup.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { setUpFrom } from '#tests/support/set-up.ts';
import {
  failOnConsole,
  newHousehold,
  startTestServer,
  type TestClient,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

const PDF = '%PDF-1.7\n';
const COST = {
  on: day('2025-11-02'),
  kind: 'repair' as const,
  label: 'Isolator',
  amountCents: cents(21_000),
  documentId: null,
  every: null,
  until: null,
};

let server: TestServer;
let home: TestHousehold;
let preparer: TestClient;
beforeAll(async () => {
  server = await startTestServer();
  home = await newHousehold(server);
  preparer = await home.person('Marisol', 'preparer');
  setUpFrom(server, home, buildHousehold({ cycles: 2 }));
  const year = { status: 'filed', filedOn: day('2026-03-08'), refundOn: null, asRefund: false } as const;
  await home.owner.call(creditApi.putYear, {
    params: { ...home.params, taxYear: '2025' },
    body: { ...year, limitCents: cents(520_000), limitFrom: null, documentId: null },
  });
});
afterAll(() => server.close());

const send = (fileName: string, bytes: Uint8Array | string, who: TestClient = home.owner) =>
  who.call(moneyPapersApi.add, { params: home.params, file: { fileName, bytes } });
const link = (kind: string, id: string, documentId: string | null) =>
  home.owner.call(moneyPapersApi.link, { params: home.params, body: { kind: kind as 'cost', id, documentId } });
const papers = async () => (await home.owner.call(moneyPapersApi.list, { params: home.params })).value;
const rows = (table: string) => server.deps.sqlite.prepare(`SELECT count(*) FROM ${table}`).pluck().get();

describe('a paper of Money', () => {
  it('is kept as it came, says who added it when, and comes back to be saved and never shown', async () => {
    const { value } = await send('loan statement.pdf', `${PDF}loan`);
    expect(value.alreadyHere).toBe(false);
    expect(value.view.papers.find(({ id }) => id === value.documentId)).toMatchObject({
      fileName: 'loan statement.pdf',
      kind: 'other',
      uploadedBy: 'Priya',
      proves: [],
      removable: true,
    });
    const params = { ...home.params, documentId: value.documentId };
    const answer = await home.owner.call(moneyPapersApi.paper, { params });
    expect(answer.text).toBe(`${PDF}loan`);
    expect(answer.headers.get('content-disposition')).toMatch(/^attachment; /);
    expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
    expect(answer.headers.get('content-security-policy')).toBe("default-src 'none'; sandbox");
  });

  it('with the same bytes again changes nothing and answers the paper that is here', async () => {
    const first = (await send('once.pdf', `${PDF}once`)).value;
    const before = [rows('documents'), rows('audit_events')];
    const again = (await send('twice.pdf', `${PDF}once`)).value;
    expect(again).toMatchObject({ documentId: first.documentId, alreadyHere: true });
    expect([rows('documents'), rows('audit_events')]).toEqual(before);
  });

  it('that lies in the log in progress is left there', async () => {
    const bytes = 'Time,Production (kWh)\n2025-06-14 00:00,1\n2025-06-14 01:00,1\n';
    await home.owner.call(logApi.addProductionFile, {
      params: home.params,
      file: { fileName: 'made.csv', bytes },
      fields: { channel: 'production' },
    });
    expect((await send('made.csv', bytes)).problem.code).toBe('file-already-here');
  });

  it.each([
    ['a page named PDF', 'statement.pdf', '<html><script>alert(1)</script></html>', 415, 'file-wrong-kind'],
    ['a page', 'statement.html', '<html></html>', 415, 'file-wrong-kind'],
    ['a drawing that can hold a script', 'seal.svg', '<svg></svg>', 415, 'file-wrong-kind'],
    ['binary content named CSV', 'a.csv', new Uint8Array([97, 0, 98]), 415, 'file-wrong-kind'],
    ['an empty file', 'empty.pdf', '', 422, 'file-empty'],
    ['a file that is too large', 'big.pdf', new Uint8Array(UPLOAD_LIMIT_BYTES + 1), 413, 'file-too-large'],
  ])('%s is refused and leaves nothing behind', async (_what, fileName, bytes, status, code) => {
    const before = rows('documents');
    const refused = await send(fileName, bytes);
    expect([refused.status, refused.problem.code]).toEqual([status, code]);
    expect(rows('documents')).toBe(before);
  });

  it('may be read by a member, and is not there for a tax preparer', async () => {
    const { documentId } = (await send('deed.pdf', `${PDF}deed`)).value;
    const params = { ...home.params, documentId };
    const member = await home.person('Jonah', 'member');
    expect((await member.call(moneyPapersApi.paper, { params })).status).toBe(200);
    expect((await member.call(moneyPapersApi.list, { params: home.params })).status).toBe(200);
    expect((await send('x.pdf', `${PDF}x`, member)).status).toBe(403);
    expect((await preparer.call(moneyPapersApi.list, { params: home.params })).status).toBe(403);
    expect((await preparer.call(moneyPapersApi.paper, { params })).status).toBe(403);
    expect((await preparer.call(creditApi.paper, { params })).status).toBe(404);
  });

  it('of another household is unknown here, to take, to name and to remove', async () => {
    const theirs = await newHousehold(server, 'Bertrand', '4 Gull Court');
    const { documentId } = (
      await theirs.owner.call(moneyPapersApi.add, {
        params: theirs.params,
        file: { fileName: 'theirs.pdf', bytes: `${PDF}theirs` },
      })
    ).value;
    const params = { ...home.params, documentId };
    expect((await home.owner.call(moneyPapersApi.paper, { params })).status).toBe(404);
    expect((await home.owner.call(moneyPapersApi.remove, { params })).status).toBe(404);
    expect((await link('loan', '', documentId)).problem).toMatchObject({ code: 'invalid-fields' });
    const cost = await home.owner.call(moneyApi.addCost, { params: home.params, body: { ...COST, documentId } });
    expect(cost.problem.faults).toMatchObject([{ field: 'documentId' }]);
    expect((await theirs.owner.call(moneyPapersApi.paper, { params: { ...theirs.params, documentId } })).status).toBe(
      200,
    );
  });
});

describe('what a paper proves', () => {
  const lists = async () => {
    const { targets } = await papers();
    return targets.map(({ kind }) => kind);
  };

  it('is any fact of Money, each of which can take one and lose it again', async () => {
    const { params, owner } = home;
    const at = { on: day('2025-09-01'), amountCents: cents(50_000), note: null, documentId: null };
    await owner.call(moneyApi.addLoanPayment, {
      params,
      body: { ...at, extraPrincipalCents: cents(0), reamortize: false },
    });
    await owner.call(moneyApi.addReceipt, { params, body: { ...at, from: null, to: null, quantityWh: null } });
    await owner.call(moneyApi.addCost, { params, body: COST });
    await owner.call(moneyOtherApi.addLoan, {
      params,
      body: {
        kind: 'homeEquity',
        lender: 'Calder Savings',
        principalCents: cents(500_000),
        dealerFeeCents: cents(0),
        annualRate: '0.07',
        termMonths: 120,
        fundedOn: day('2025-05-20'),
        firstPaymentOn: day('2025-07-01'),
        documentId: null,
      },
    });
    await owner.call(moneyOtherApi.putLease, {
      params,
      body: {
        kind: 'lease',
        company: 'Roof Lettings',
        firstPaymentOn: day('2025-07-01'),
        termMonths: 240,
        monthlyCents: cents(9_000),
        ratePerKwh: null,
        yearlyRise: '0.02',
        documentId: null,
      },
    });
    const sqlite = server.deps.sqlite;
    const more = (table: string, value: object) =>
      sqlite
        .prepare(`UPDATE ${table} SET more = json_patch(more, ?) WHERE household_id = ?`)
        .run(JSON.stringify(value), home.id);
    const balance = { on: '2025-10-01', balanceCents: 2_900_000, documentId: null };
    const terms = { lender: 'L', principalCents: 1_000_000, annualRate: '0.05', termMonths: 60, costsCents: 0 };
    more('loans', {
      balances: [{ id: 'b1', ...balance }],
      refinances: [{ id: 'r1', on: '2026-10-01', firstPaymentOn: '2026-11-01', documentId: null, ...terms }],
    });
    more('mortgages', {
      balances: [{ id: 'b2', ...balance }],
      appraisals: [{ id: 'a1', on: '2025-08-01', valueCents: 45_000_000, how: 'appraisal', documentId: null }],
    });
    // What was laid straight into the tables is read from the next change on.
    const paper = (await send('everything.pdf', `${PDF}everything`)).value.documentId;
    const kinds = await lists();
    expect(new Set(kinds)).toEqual(
      new Set([
        'loan',
        'loanPayment',
        'lenderBalance',
        'refinance',
        'otherLoan',
        'lease',
        'mortgage',
        'mortgageBalance',
        'appraisal',
        'cost',
        'receipt',
        'creditCost',
        'creditYear',
      ]),
    );
    const { targets } = await papers();
    const ofCredit = (kind: string) => kind === 'creditCost' || kind === 'creditYear';
    for (const { kind, id } of targets.filter((target) => !ofCredit(target.kind))) {
      const { value } = await link(kind, id, paper);
      expect(value.papers.find((one) => one.id === paper)?.proves).toContainEqual(
        expect.objectContaining({ kind, id, documentId: paper }),
      );
    }
    const full = (await papers()).papers.find(({ id }) => id === paper);
    expect(full?.proves).toHaveLength(targets.filter(({ kind }) => !ofCredit(kind)).length);
    const refused = await home.owner.call(moneyPapersApi.remove, { params: { ...params, documentId: paper } });
    expect([refused.status, refused.problem.code]).toEqual([409, 'conflict']);
    expect(refused.problem.detail).toMatch(
      /^everything\.pdf stands behind .*Roof Lettings.*Take it off there first\.$/,
    );
    for (const { kind, id } of full?.proves ?? []) await link(kind, id, null);
    expect((await papers()).papers.find(({ id }) => id === paper)).toMatchObject({ proves: [], removable: true });
    const removed = await home.owner.call(moneyPapersApi.remove, { params: { ...params, documentId: paper } });
    expect(removed.value.papers.some(({ id }) => id === paper)).toBe(false);
    expect((await home.owner.call(moneyPapersApi.paper, { params: { ...params, documentId: paper } })).status).toBe(
      404,
    );
  });

  it('is the working’s source of the figure typed from it', async () => {
    const { documentId } = (await send('invoice.pdf', `${PDF}invoice`)).value;
    const body = { ...COST, label: 'Inverter fan', documentId };
    await home.owner.call(moneyApi.addCost, { params: home.params, body });
    const { costs } = (await home.owner.call(moneyOtherApi.view, { params: home.params })).value;
    const cost = costs.costs.find(({ label }) => label === 'Inverter fan');
    const working = costs.standings.find(({ id }) => id === cost?.id)?.each?.working;
    expect(working?.inputs[0]?.source).toEqual({
      kind: 'document',
      documentId,
      fileName: 'invoice.pdf',
      place: 'the whole file',
    });
  });

  it('of a tax return is one of the credit’s own papers, which a preparer may open', async () => {
    const money = (await send('return.pdf', `${PDF}return`)).value.documentId;
    const refused = await link('creditYear', '2025', money);
    expect(refused.problem.faults).toMatchObject([{ field: 'documentId' }]);
    const { value } = await home.owner.call(creditApi.addPaper, {
      params: home.params,
      file: { fileName: 'form.pdf', bytes: `${PDF}form` },
    });
    const ofCredit = value.papers.find(({ fileName }) => fileName === 'form.pdf')?.id ?? '';
    const linked = (await link('creditYear', '2025', ofCredit)).value;
    expect(linked.papers.find(({ id }) => id === ofCredit)).toMatchObject({ kind: 'credit', removable: false });
    const params = { ...home.params, documentId: ofCredit };
    expect((await preparer.call(creditApi.paper, { params })).status).toBe(200);
    const removed = await home.owner.call(moneyPapersApi.remove, { params });
    expect(removed.problem.detail).toBe('form.pdf was added on another screen and stays with it.');
  });

  it('cannot be what is not there any more', async () => {
    expect((await link('loanPayment', 'gone', null)).status).toBe(404);
    expect((await link('nothing', '', null)).problem.code).toBe('invalid-fields');
  });

  it('stays through the set-up, which does not ask for it', async () => {
    const { documentId } = (await send('signing.pdf', `${PDF}signing`)).value;
    const { owner, params } = home;
    const view = (await owner.call(setupApi.view, { params })).value;
    const signing = view.costs.find(({ kind }) => kind === 'signing');
    if (signing === undefined) throw new Error('nothing was signed');
    await link('cost', signing.id, documentId);
    const save = (paper: string | null) =>
      owner.call(setupApi.cash, {
        params,
        body: { costs: [{ ...signing, documentId: paper }], upkeepYearlyCents: cents(0) },
      });
    expect((await save(documentId)).status).toBe(200);
    expect((await papers()).papers.find(({ id }) => id === documentId)?.proves).toHaveLength(1);
    const other = (await send('other.pdf', `${PDF}other`)).value.documentId;
    expect((await save(other)).problem.faults).toMatchObject([{ field: 'costs.0.documentId' }]);
  });
});

describe('a change of papers', () => {
  it('is in the record of who did what', () => {
    const actions = server.deps.sqlite
      .prepare('SELECT DISTINCT action FROM audit_events WHERE household_id = ?')
      .pluck()
      .all(home.id);
    expect(actions).toEqual(expect.arrayContaining(['paper-added', 'paper-linked', 'paper-unlinked', 'paper-removed']));
  });

  it('leaves the position as it was: papers move no money', async () => {
    const settled = async () =>
      (await home.owner.call(positionApi.view, { params: home.params })).value.position.settledToday.amountCents;
    const before = await settled();
    const { documentId } = (await send('last.pdf', `${PDF}last`)).value;
    await link('loan', '', documentId);
    expect(await settled()).toBe(before);
  });
});
