import { sayKwh } from '../../ledger/say.ts';
import { edit, hypothesis } from './edit.ts';
import { withFlows } from './meter-reads.ts';

/** Import billed as export, and export as import (net-metering.md §4, "swapped registers"). */
export const registersSwapped = hypothesis('registersSwapped', ({ cycle: { usage } }) => [
  edit(
    'swapped',
    { usage: withFlows(usage, ({ importWh, exportWh }) => ({ importWh: exportWh, exportWh: importWh })) },
    `Import and export were exchanged: ${sayKwh(usage.exportWh)} kWh were billed as import and ${sayKwh(usage.importWh)} kWh as export.`,
  ),
]);
