// Adds up what `npm run ledger` printed, sharing no code with the product: by entry, by cycle, by book, and as printed.
// Usage: node re-add.mjs ledger.json   (prints one line of JSON; exit 1 when the sums are not equal)
import { readFileSync } from 'node:fs';

const printed = JSON.parse(readFileSync(process.argv[2], 'utf8'));
const faults = [];
let byEntry = 0;
const cycles = new Map();
const books = new Map();
for (const [book, entries] of Object.entries(printed.books)) {
  let sum = 0;
  for (const entry of entries) {
    if (entry.basis === 'memo') continue;
    byEntry += entry.amountCents;
    sum += entry.amountCents;
    cycles.set(entry.cycle, (cycles.get(entry.cycle) ?? 0) + entry.amountCents);
  }
  books.set(book, sum);
}

let byCycle = 0;
let running = 0;
for (const point of printed.position.byCycle) {
  byCycle += point.addedCents;
  running += point.addedCents;
  const own = cycles.get(point.cycle) ?? 0;
  if (own !== point.addedCents) faults.push(`cycle ${point.cycle}: entries add to ${own}, printed ${point.addedCents}`);
  if (running !== point.cashSoFarCents)
    faults.push(`cycle ${point.cycle}: cash so far is ${running}, printed ${point.cashSoFarCents}`);
  const settled =
    point.cashSoFarCents +
    point.loanPayoffCents +
    point.creditStillToComeCents +
    point.incentiveOwedCents +
    point.utilityBankCents;
  if (settled !== point.settledTodayCents)
    faults.push(`cycle ${point.cycle}: settled today is ${settled}, printed ${point.settledTodayCents}`);
  cycles.delete(point.cycle);
}
for (const key of cycles.keys()) faults.push(`entries name cycle ${key}, which the position does not hold`);
for (const cycle of printed.cycles) {
  const point = printed.position.byCycle.find((one) => one.cycle === cycle.to);
  if (point?.addedCents !== cycle.addedCents) faults.push(`cycle ${cycle.to}: its page and the position differ`);
  const ids = new Set(cycle.entryIds);
  let sum = 0;
  for (const entries of Object.values(printed.books)) {
    for (const entry of entries) if (ids.has(entry.id) && entry.basis !== 'memo') sum += entry.amountCents;
  }
  if (sum !== cycle.addedCents)
    faults.push(`cycle ${cycle.to}: its entries add to ${sum}, printed ${cycle.addedCents}`);
}

let byBook = 0;
for (const [book, sum] of books) {
  byBook += sum;
  const point = printed.position.byCycle.reduce((total, one) => total + one.books[book], 0);
  if (point !== sum) faults.push(`book ${book}: entries add to ${sum}, by cycle ${point}`);
  if (printed.position.byBook[book] !== sum)
    faults.push(`book ${book}: printed ${printed.position.byBook[book]}, entries ${sum}`);
  const listed = printed.position.sums.all[book]?.amountCents ?? 0;
  if (listed !== sum) faults.push(`book ${book}: how it adds up says ${listed}, entries ${sum}`);
}

const position = printed.position.cashSoFar.amountCents;
if (byEntry !== byCycle || byEntry !== byBook || byEntry !== position) {
  faults.push(`by entry ${byEntry}, by cycle ${byCycle}, by book ${byBook}, printed ${position}`);
}
process.stdout.write(
  `${JSON.stringify({ byEntry, byCycle, byBook, position, entries: [...books.keys()].length, faults })}\n`,
);
process.exitCode = faults.length === 0 ? 0 : 1;
