// `npm run bench`: figures as ratios to a floor measured in the same run. Not a timed test: machines differ, ratios less.
import { cpus } from 'node:os';
import { benchImport } from './import.ts';
import { benchPosition } from './position.ts';
import { benchSettlement } from './settlement.ts';

const rows = [...(await benchPosition()), ...(await benchImport()), ...(await benchSettlement())];
process.stdout.write(`Node ${process.version}, ${cpus().length} × ${cpus()[0]?.model ?? 'unknown processor'}\n\n`);
for (const row of rows) {
  const ratio = row.ratio === null ? '' : `  ${Math.round(row.ratio * 10) / 10} × floor`;
  process.stdout.write(`${row.name}: ${Math.round(row.value * 100) / 100} ${row.unit}${ratio}  (${row.aim})\n`);
}
