import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addPaper } from '#server/services/credit/papers.ts';
import { creditApi } from '#shared/api/credit.ts';
import { moneyApi } from '#shared/api/money.ts';
import { moneyMortgageApi } from '#shared/api/money-mortgage.ts';
import { peopleApi } from '#shared/api/people.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import { setUpFrom } from '#tests/support/set-up.ts';
import {
  failOnConsole,
  must,
  newHousehold,
  startTestServer,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

const facts = buildHousehold({ cycles: 2 });
let server: TestServer;
let home: TestHousehold;
beforeAll(async () => {
  server = await startTestServer();
  home = await newHousehold(server);
  setUpFrom(server, home, facts);
});
afterAll(() => server.close());

const paperNamed = (fileName: string) => ({ fileName, bytes: Buffer.from(`%PDF-1.7 ${fileName}`) });

describe('the credit’s years, costs and carryforward', () => {
  const year = {
    limitCents: cents(520_000),
    limitFrom: 'line 14 worksheet, 2025 return',
    status: 'filed' as const,
    filedOn: day('2026-03-08'),
    refundOn: null,
    asRefund: true,
    documentId: null as string | null,
  };
  const put = (taxYear: string, body: object) =>
    home.owner.call(creditApi.putYear, { params: { ...home.params, taxYear }, body: body as never });

  it('a year names the worksheet and the return its limit came from', async () => {
    must(addPaper(server.deps, home.actor, paperNamed('scan.pdf'), 'return'));
    const { papers } = (await home.owner.call(creditApi.view, { params: home.params })).value;
    expect(papers.map(({ fileName, paperKind }) => [fileName, paperKind])).toEqual([['return, scan.pdf', 'return']]);
    const saved = (await put('2025', { ...year, documentId: papers[0]?.id ?? '' })).value;
    expect(saved.credit?.years[0]).toMatchObject({ limitFrom: year.limitFrom, documentId: papers[0]?.id });
    const worked = everyWorking(saved);
    expect(worked.map(({ path }) => path)).toContain('basis.whole');
    expect(worked.filter(({ agrees }) => !agrees)).toEqual([]);
  });

  it('refuses a paper that is not the credit’s, and a filed return without its line 14', async () => {
    expect((await put('2025', { ...year, documentId: 'nothing' })).problem.faults[0]?.field).toBe('documentId');
    expect((await put('2025', { ...year, limitCents: null })).problem.faults[0]?.field).toBe('limitCents');
    expect((await put('2025', { ...year, typedBy: 'me' })).status).toBe(400);
  });

  it('a cost completed in another year is a vintage of its own', async () => {
    const before = (await home.owner.call(creditApi.view, { params: home.params })).value;
    const cost = before.credit?.costs.find(({ treatment }) => treatment === 'qualified');
    const params = { ...home.params, id: cost?.id ?? '' };
    const body = { placedInServiceOn: day('2026-02-01'), documentId: null };
    const after = (await home.owner.call(creditApi.putCost, { params, body })).value;
    expect(after.vintages.map((one) => [one.year, one.state])).toEqual([
      [2025, 'counts'],
      [2026, 'noCredit'],
    ]);
    const back = await home.owner.call(creditApi.putCost, { params, body: { ...body, placedInServiceOn: null } });
    expect(back.value.lines).toEqual(before.lines);
    const unknown = await home.owner.call(creditApi.putCost, { params: { ...params, id: 'none' }, body });
    expect(unknown.status).toBe(404);
    const foreign = await home.owner.call(creditApi.putCost, { params, body: { ...body, documentId: 'none' } });
    expect(foreign.problem.faults[0]?.field).toBe('documentId');
  });

  it('what was carried in comes before every listed year, and no year may come before it', async () => {
    const carry = (carriedIn: object | null) =>
      home.owner.call(creditApi.putCarriedIn, { params: home.params, body: { carriedIn } as never });
    expect((await carry({ taxYear: 2025, amountCents: 100 })).problem.faults[0]?.field).toBe('carriedIn.taxYear');
    expect((await carry({ taxYear: 1900, amountCents: 100 })).problem.faults[0]?.field).toBe('carriedIn.taxYear');
    const view = (await carry({ taxYear: 2024, amountCents: 150_000 })).value;
    expect(view.lines[0]?.line12Cents).toBe(150_000);
    expect(view.basis).toBeNull();
    expect((await put('2024', year)).status).toBe(409);
    expect((await carry(null)).value.lines[0]?.line12Cents).toBe(0);
  });

  it('a paper is said to be something else; its bytes stay', async () => {
    const { papers } = (await home.owner.call(creditApi.view, { params: home.params })).value;
    const params = { ...home.params, documentId: papers[0]?.id ?? '' };
    const view = (await home.owner.call(creditApi.putPaperKind, { params, body: { kind: 'contract' } })).value;
    expect(view.papers[0]).toMatchObject({ fileName: 'contract, scan.pdf', sha256: papers[0]?.sha256 });
    expect((await home.owner.call(creditApi.paper, { params })).text).toBe('%PDF-1.7 scan.pdf');
    const gone = { ...params, documentId: 'none' };
    expect((await home.owner.call(creditApi.putPaperKind, { params: gone, body: { kind: 'contract' } })).status).toBe(
      404,
    );
  });

  it('is handed over as a PDF of two pages, the same bytes for the same facts on the same day', async () => {
    const one = await home.owner.call(creditApi.summaryPdf, { params: home.params });
    expect(one.headers.get('content-type')).toBe('application/pdf');
    expect(one.headers.get('content-disposition')).toContain('tax-credit-summary-2026-12-01.pdf');
    expect(one.text.startsWith('%PDF-')).toBe(true);
    expect(one.text.match(/\/Type \/Page\b/g)).toHaveLength(2);
    expect(one.text.length).toBeGreaterThan(8_000);
    const again = await home.owner.call(creditApi.summaryPdf, { params: home.params });
    expect(again.text).toBe(one.text);
  });

  it('is told by the file in the same figures, with sources, vintages, basis and papers', async () => {
    const { text } = await home.owner.call(creditApi.summaryCsv, { params: home.params });
    const { lines } = (await home.owner.call(creditApi.view, { params: home.params })).value;
    expect(text).toContain(`Used,15,${(lines[0]?.line15Cents ?? 0) / 100}.00`);
    expect(text).toContain('line 14 worksheet, 2025 return; typed by Priya; paper: contract, scan.pdf');
    expect(text).toMatch(/\r\n2025,0\.30,/);
    expect(text).toContain('Effect on the home’s basis');
    expect(text).toContain('Made by,Priya');
  });
});

describe('the mortgage and its insurance', () => {
  const { view: viewOf } = moneyMortgageApi;
  const view = async () => {
    const { mortgage } = (await home.owner.call(viewOf, { params: home.params })).value;
    if (mortgage === null) throw new Error('the household has a mortgage');
    return mortgage;
  };

  it('shows every end with its section, and workings that come to their figures', async () => {
    const mortgage = await view();
    expect(mortgage.ends.map(({ rule, source }) => [rule, source])).toEqual([
      ['request80', '12 U.S.C. 4901(2), 4902(a)'],
      ['automatic78', '12 U.S.C. 4902(b)'],
      ['midpoint', '12 U.S.C. 4902(c)'],
      ['appreciation', null],
    ]);
    const worked = everyWorking(mortgage);
    expect(worked.map(({ path }) => path)).toContain('balance');
    expect(worked.filter(({ agrees }) => !agrees)).toEqual([]);
    const money = (await home.owner.call(moneyApi.view, { params: home.params })).value;
    expect(mortgage.avoidedCents).toBe(money.insurance?.avoidedCents);
  });

  it('a value and a balance are added and taken back, and leave everything as it was', async () => {
    const before = await view();
    const appraisal = {
      on: day('2026-10-02'),
      valueCents: cents(60_000_000),
      how: 'appraisal' as const,
      documentId: null,
    };
    await home.owner.call(moneyMortgageApi.addAppraisal, { params: home.params, body: appraisal });
    const balance = { on: day('2026-12-01'), balanceCents: cents(20_000_000), documentId: null };
    await home.owner.call(moneyMortgageApi.addBalance, { params: home.params, body: balance });
    const added = await view();
    expect(added.balance.amountCents).toBe(20_000_000);
    expect(added.latest?.valueCents).toBe(60_000_000);
    expect(added.schedule.filter(({ stated }) => stated)).toHaveLength(1);
    expect(everyWorking(added).filter(({ agrees }) => !agrees)).toEqual([]);
    for (const { id } of added.facts.appraisals) {
      await home.owner.call(moneyMortgageApi.removeAppraisal, { params: { ...home.params, id } });
    }
    for (const { id } of added.facts.balances) {
      await home.owner.call(moneyMortgageApi.removeBalance, { params: { ...home.params, id } });
    }
    expect(await view()).toEqual(before);
    const gone = { ...home.params, id: added.facts.appraisals[0]?.id ?? '' };
    expect((await home.owner.call(moneyMortgageApi.removeAppraisal, { params: gone })).status).toBe(404);
    expect((await home.owner.call(moneyMortgageApi.removeBalance, { params: gone })).status).toBe(404);
  });

  it('refuses days to come, days before the mortgage and papers that are not here, at their fields', async () => {
    const appraise = (body: object) =>
      home.owner.call(moneyMortgageApi.addAppraisal, { params: home.params, body: body as never });
    const good = { on: '2026-10-02', valueCents: 60_000_000, how: 'appraisal', documentId: null };
    expect((await appraise({ ...good, on: '2026-12-02' })).problem.faults[0]?.field).toBe('on');
    expect((await appraise({ ...good, documentId: 'none' })).problem.faults[0]?.field).toBe('documentId');
    expect((await appraise({ ...good, valueCents: 0 })).status).toBe(400);
    expect((await appraise({ ...good, id: 'mine' })).status).toBe(400);
    const early = { on: day('1999-01-01'), balanceCents: cents(1), documentId: null };
    const refused = await home.owner.call(moneyMortgageApi.addBalance, { params: home.params, body: early });
    expect(refused.problem.faults[0]?.field).toBe('on');
  });

  it('the record, another end and later premiums are kept, through the set-up’s own changes too', async () => {
    const record = {
      latePayments: { thirtyIn12: 0, sixtyIn24: 0 },
      units: 1,
      occupancy: 'principal' as const,
      otherLien: false,
      requestedOn: null,
    };
    await home.owner.call(moneyMortgageApi.putRecord, { params: home.params, body: record });
    const premiums = [
      { from: day('2027-01-01'), premiumMonthlyCents: cents(9_000) },
      { from: day('2026-01-01'), premiumMonthlyCents: cents(12_000) },
    ];
    await home.owner.call(moneyMortgageApi.putPremiums, { params: home.params, body: { premiums } });
    const end = { endRule: 'midpoint' as const, appreciationOn: null };
    const chosen = (await home.owner.call(moneyMortgageApi.putEnd, { params: home.params, body: end })).value.mortgage;
    expect(chosen?.governs?.rule).toBe('midpoint');
    expect(chosen?.premiumCents).toBe(12_000);
    expect(chosen?.facts.premiums.map(({ from }) => from)).toEqual(['2026-01-01', '2027-01-01']);
    expect(chosen?.checklist.find(({ id }) => id === 'payments')?.state).toBe('ready');
    const twice = { premiums: [premiums[0], premiums[0]] };
    const refused = await home.owner.call(moneyMortgageApi.putPremiums, { params: home.params, body: twice as never });
    expect(refused.problem.faults[0]?.field).toBe('premiums.1.from');
    const undated = { endRule: 'appreciation' as const, appreciationOn: null };
    const noDay = await home.owner.call(moneyMortgageApi.putEnd, { params: home.params, body: undated });
    expect(noDay.problem.faults[0]?.field).toBe('appreciationOn');
  });

  it('its schedule is a table whose last balance is zero', async () => {
    const { text, headers } = await home.owner.call(moneyMortgageApi.scheduleCsv, { params: home.params });
    expect(headers.get('content-disposition')).toContain('mortgage-schedule-2026-12-01.csv');
    const rows = text.trim().split('\r\n');
    expect(rows).toHaveLength((await view()).schedule.length + 1);
    expect(rows.at(-1)?.split(',')[6]).toBe('0.00');
  });

  it('without a mortgage there is none to show, to change or to load', async () => {
    const bare = await newHousehold(server, 'Bertrand', '4 Gull Court');
    expect((await bare.owner.call(viewOf, { params: bare.params })).value.mortgage).toBeNull();
    expect((await bare.owner.call(moneyMortgageApi.scheduleCsv, { params: bare.params })).status).toBe(404);
    const appraisal = { on: day('2026-10-02'), valueCents: cents(1), how: 'appraisal' as const, documentId: null };
    const refused = await bare.owner.call(moneyMortgageApi.addAppraisal, { params: bare.params, body: appraisal });
    expect(refused.status).toBe(409);
    const end = { endRule: 'midpoint' as const, appreciationOn: null };
    expect((await bare.owner.call(moneyMortgageApi.putEnd, { params: bare.params, body: end })).status).toBe(409);
    const carried = await bare.owner.call(creditApi.putCarriedIn, { params: bare.params, body: { carriedIn: null } });
    expect(carried.status).toBe(409);
    expect((await bare.owner.call(creditApi.summaryPdf, { params: bare.params })).status).toBe(200);
    expect((await bare.owner.call(creditApi.summaryCsv, { params: bare.params })).text).toContain('No tax credit');
  });

  it('a member reads and loads it, and a preparer does not see it', async () => {
    const member = await home.person('Jonah', 'member');
    const preparer = await home.person('Marisol', 'preparer');
    expect((await member.call(viewOf, { params: home.params })).status).toBe(200);
    expect((await member.call(moneyMortgageApi.scheduleCsv, { params: home.params })).status).toBe(200);
    const premiums = { premiums: [] };
    expect((await member.call(moneyMortgageApi.putPremiums, { params: home.params, body: premiums })).status).toBe(403);
    expect((await preparer.call(viewOf, { params: home.params })).status).toBe(403);
    expect((await preparer.call(creditApi.summaryPdf, { params: home.params })).status).toBe(200);
  });

  it('all of it comes back from the export', async () => {
    const { text } = await home.owner.call(peopleApi.exportHousehold, { params: home.params });
    const exported = JSON.parse(text);
    expect(exported.facts.mortgage.premiums).toHaveLength(2);
    expect(exported.facts.mortgage.latePayments).toEqual({ thirtyIn12: 0, sixtyIn24: 0 });
    expect(exported.facts.credit.years[0].limitFrom).toBe('line 14 worksheet, 2025 return');
  });
});
