import type { Cycle, CycleEnergy, EnergyFigure } from '#shared/ledger/cycle.ts';
import { kwh } from '#src/lib/format.ts';
import { Sheet } from '#src/ui/sheet.tsx';
import { FigureButton } from '#src/ui/working.tsx';
import { type BarPart, type EnergyBars, energyBars, missingEnergy } from './energy-bars.ts';
import { MeterRows } from './meter-rows.tsx';

const LOOKS: Record<BarPart['key'], string> = {
  selfUse: 'bg-roof text-sheet',
  fromRoof: 'bg-roof text-sheet',
  made: 'bg-roof text-sheet',
  sentOut: 'bg-sent text-ink',
  bought: 'hatch-grid text-sheet',
  used: 'hatch-grid text-sheet',
};

/** "Where the energy went": what the roof made over what the house used, on one scale, so that self-use stands above itself. */
export function EnergySheet({ cycle }: { cycle: Cycle }) {
  const { energy } = cycle;
  const bars = energyBars(energy);
  const missing = missingEnergy(energy);
  return (
    <Sheet
      title="Where the energy went"
      hint={bars ? 'Both bars share one scale, so what the house used from its own roof lines up.' : undefined}
    >
      {bars && (
        <div className="mt-3">
          <p className="hint" style={{ paddingLeft: `${bars.offset * 100}%` }}>
            <RoofLine energy={energy} />
          </p>
          <div className="relative">
            <Bar parts={bars.roof} offset={bars.offset} />
            <div className="h-3.5" />
            <Bar parts={bars.house} offset={0} />
            {bars.house.some((part) => part.key === 'fromRoof') && (
              <>
                <Guide at={bars.offset} />
                <Guide at={bars.offset + (bars.roof[0]?.share ?? 0)} />
              </>
            )}
          </div>
          <p className="hint mt-1">
            <HouseLine energy={energy} />
          </p>
          <Legend parts={bars.legend} />
        </div>
      )}
      {missing.map((line) => (
        <p key={line} className="mt-2">
          {line}
        </p>
      ))}
      <MeterRows cycle={cycle} />
      {coverageLines(energy).map((line) => (
        <p key={line} className="hint mt-1">
          {line}
        </p>
      ))}
    </Sheet>
  );
}

/** A dotted line down both bars, where self-use begins and ends in each. */
function Guide({ at }: { at: number }) {
  return (
    <i
      aria-hidden="true"
      className="absolute -inset-y-1.5 -ml-[2px] w-0 border-l-2 border-dotted border-ink"
      style={{ left: `${at * 100}%` }}
    />
  );
}

function Bar({ parts, offset }: { parts: BarPart[]; offset: number }) {
  return (
    <div className="flex h-11" style={{ paddingLeft: `${offset * 100}%` }}>
      {parts.map((part) => (
        <div
          key={part.key}
          className={`@container flex min-w-0.5 items-center overflow-hidden rounded-[2px] border-r-2 border-sheet font-semibold ${LOOKS[part.key]}`}
          style={{ width: `${(part.share / (1 - offset)) * 100}%` }}
          title={`${part.label} ${kwh(part.figure.wh)} kWh`}
        >
          <span className="hidden px-3 whitespace-nowrap @min-[88px]:inline">
            <span className={part.label.length > 8 ? 'hidden @min-[190px]:inline' : 'hidden @min-[148px]:inline'}>
              {part.label}{' '}
            </span>
            <FigureButton title={part.title} text={`${kwh(part.figure.wh)} kWh`} working={part.figure.working} />
          </span>
        </div>
      ))}
    </div>
  );
}

/** Parts too narrow for their label are named under the bars; on a phone that is every part. */
function Legend({ parts }: { parts: EnergyBars['legend'] }) {
  return (
    <ul className="mt-2 flex flex-wrap gap-x-6 gap-y-1 text-[15px]">
      {parts.map((part) => (
        <li key={part.key} className={part.narrow ? undefined : 'sm:hidden'}>
          <i
            aria-hidden="true"
            className={`mr-2 inline-block size-[11px] rounded-[2px] align-[-1px] ${LOOKS[part.key]}`}
          />
          {part.label}{' '}
          <FigureButton title={part.title} text={`${kwh(part.figure.wh)} kWh`} working={part.figure.working} />
        </li>
      ))}
    </ul>
  );
}

function RoofLine({ energy }: { energy: CycleEnergy }) {
  if (!energy.production) return 'What the roof made is not known.';
  return (
    <>
      The roof made <Energy title="Production" figure={energy.production} />
      {energy.production.from === 'monitor' && ', as the inverter tells it'}
    </>
  );
}

function HouseLine({ energy }: { energy: CycleEnergy }) {
  const { use, selfUse } = energy;
  if (!use || !selfUse) return 'How much the house used in all is not known.';
  const share = use.wh > 0 ? Math.round((selfUse.wh / use.wh) * 100) : 0;
  return (
    <>
      The house used <Energy title="Use" figure={use} />, {share}% of it from the roof
    </>
  );
}

function Energy({ title, figure }: { title: string; figure: EnergyFigure }) {
  return (
    <FigureButton
      title={title}
      text={`${kwh(figure.wh)} kWh`}
      working={figure.working}
      className="font-semibold text-ink"
    />
  );
}

const NAMES: [keyof CycleEnergy, string][] = [
  ['import', 'Import'],
  ['export', 'Export'],
  ['production', 'Production'],
];

function coverageLines(energy: CycleEnergy): string[] {
  return NAMES.flatMap(([key, name]) => {
    const figure = energy[key];
    if (!figure || figure.coverage >= 1) return [];
    return [`${name}: the readings cover ${Math.floor(figure.coverage * 100)}% of the cycle’s days.`];
  });
}
