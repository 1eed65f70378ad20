import type { Outcome } from '#shared/try/outcome.ts';
import { money } from '#src/lib/format.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FigureButton } from '#src/ui/working.tsx';
import type { Beside } from './beside.ts';
import { changeLook } from './line-look.ts';
import { BASE_NAME } from './try-lines.ts';
import { type Cell, type Difference, type Judged, type TryRow, tryRows } from './try-rows.ts';

/** What changes: as things stand and with each change, with the difference in a column of its own while there is one change only. */
export function ChangesSheet({ base, beside, years }: { base: Outcome; beside: readonly Beside[]; years: number }) {
  const alone = beside.length === 1 ? beside[0] : undefined;
  const sales = beside.flatMap((one) => one.levers.sale?.on ?? []);
  return (
    <Sheet title={beside.length === 0 ? 'What it comes to' : 'What changes'}>
      <table className="ruled ruled-stack">
        <caption className="visually-hidden">The projection as things stand and with each change</caption>
        <thead>
          <tr>
            <td />
            <th scope="col">{BASE_NAME}</th>
            {beside.map((one, index) => (
              <th key={one.key} scope="col">
                {beside.length > 1 && `${changeLook(index).letter} `}
                {one.name}
              </th>
            ))}
            {alone && <th scope="col">Difference</th>}
          </tr>
        </thead>
        <tbody>
          {tryRows(years, sales).map((row) => (
            <tr key={row.key}>
              <th scope="row">{row.label}</th>
              <td data-label={BASE_NAME}>
                <CellText cell={row.cell({ outcome: base, soldOn: null })} title={`${row.label}, as things stand`} />
              </td>
              {beside.map((one) => (
                <td key={one.key} data-label={one.name}>
                  <span className="block text-right">
                    <CellText cell={row.cell(judged(one))} title={`${row.label}, ${one.name}`} />
                    {!alone && <DifferenceText row={row} base={base} one={one} small />}
                  </span>
                </td>
              ))}
              {alone && (
                <td data-label="Difference">
                  <DifferenceText row={row} base={base} one={alone} />
                </td>
              )}
            </tr>
          ))}
        </tbody>
      </table>
    </Sheet>
  );
}

function judged({ outcome, levers }: Beside): Judged {
  return { outcome, soldOn: levers.sale?.on ?? null };
}

function CellText({ cell, title }: { cell: Cell; title: string }) {
  if (cell.kind === 'money') return <MoneyFigure title={title} cents={cell.cents} working={cell.working} />;
  return <span className={cell.kind === 'none' ? 'text-soft' : 'whitespace-nowrap'}>{cell.text}</span>;
}

function DifferenceText({ row, base, one, small }: { row: TryRow; base: Outcome; one: Beside; small?: boolean }) {
  const difference = row.difference(base, judged(one));
  if (difference === null) return small ? null : <span className="text-soft">–</span>;
  const tone = difference.good === null ? 'text-soft' : difference.good ? 'pos' : 'neg';
  const shown =
    difference.kind === 'words' ? (
      <span className={tone}>{difference.text}</span>
    ) : (
      <FigureButton
        title={`${row.label}, difference`}
        text={signed(difference)}
        working={difference.working}
        className={tone}
      />
    );
  return small ? <span className="mt-1 block text-[15px] leading-[26px]">{shown}</span> : shown;
}

function signed({ cents }: Extract<Difference, { kind: 'money' }>): string {
  return cents > 0 ? `+${money(cents)}` : money(cents);
}
