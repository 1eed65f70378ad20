import type { Cycle, MeterEnergy } from '#shared/ledger/cycle.ts';
import { kwh } from '#src/lib/format.ts';
import { FigureButton } from '#src/ui/working.tsx';

const CHANNEL_NAMES = { import: 'Bought', export: 'Sent out', production: 'Made' } as const;

/** Meter by meter, where a channel has more than one: the parts of its sum, and what another service point's meter saw apart from it. */
export function MeterRows({ cycle }: { cycle: Cycle }) {
  if (cycle.meters.length === 0) return null;
  return (
    <section className="mt-5 max-w-[620px]" aria-labelledby="meter-by-meter">
      <h3 id="meter-by-meter">Meter by meter</h3>
      <table className="ruled ruled-stack">
        <thead>
          <tr>
            <th scope="col" className="text">
              Meter
            </th>
            <th scope="col" className="text">
              Counts
            </th>
            <th scope="col">kWh</th>
          </tr>
        </thead>
        <tbody>
          {cycle.meters.map((one) => (
            <tr key={`${one.channel} ${one.meter}`}>
              <th scope="row">
                {one.meter}
                {noteOf(one) !== null && <span className="hint block font-normal">{noteOf(one)}</span>}
              </th>
              <td className="text" data-label="Counts">
                {CHANNEL_NAMES[one.channel]}
              </td>
              <td data-label="kWh">
                <FigureButton
                  title={`${CHANNEL_NAMES[one.channel]}, meter ${one.meter}`}
                  text={kwh(one.figure.wh)}
                  working={one.figure.working}
                />
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

function noteOf({ label, servicePoint, counted }: MeterEnergy): string | null {
  if (servicePoint !== null) return counted ? `${servicePoint}, netted with the house` : `${servicePoint}, kept apart`;
  return label;
}
