import { useState } from 'react';
import { formatInstantUtc } from '#lib/contracts/instants';
import { readPalette } from '../draw/palette';
import { type Sheet } from '../export/drawSheet';
import { pngOfSheet, svgOfSheet, type SheetOrder } from '../export/exportSheet';
import { stripCsv, type ShownLevels } from '../model/stripCsv';

interface SavePictureProps {
  sheet: Sheet;
  /** The same as numbers, in the order of the sheet's parts. */
  levels: readonly ShownLevels[];
  ratio: number;
  summary: string;
}

const KINDS = ['png', 'svg', 'csv'] as const;

/** Saves what is shown: as a picture that explains itself, with station, period, zone, legend and limits, or as its numbers. */
export function SavePicture({ sheet, levels, ratio, summary }: SavePictureProps) {
  const [problem, setProblem] = useState<string | null>(null);
  const save = async (kind: (typeof KINDS)[number]) => {
    const order: SheetOrder = { sheet, ratio, summary, palette: readPalette(document.body) };
    try {
      const file = {
        png: () => pngOfSheet(order),
        svg: () => svgOfSheet(order),
        csv: () => new Blob([stripCsv(levels, sheet.weighting)], { type: 'text/csv;charset=utf-8' }),
      }[kind];
      offer(await file(), fileName(levels, kind));
      setProblem(null);
    } catch (error) {
      setProblem(error instanceof Error ? error.message : 'The picture cannot be made.');
    }
  };
  return (
    <div className="flex flex-wrap items-center gap-1.5 text-small" data-screen-only="">
      <span className="text-ink-soft">Save what is shown</span>
      {KINDS.map((kind) => (
        <button
          key={kind}
          type="button"
          className="button button-small"
          aria-label={`Save what is shown as ${kind.toUpperCase()}`}
          onClick={() => void save(kind)}
        >
          {kind.toUpperCase()}
        </button>
      ))}
      {problem && (
        <span role="alert" className="text-rust">
          {problem}
        </span>
      )}
    </div>
  );
}

function fileName(levels: readonly ShownLevels[], kind: string): string {
  const instant = (sec: number) => formatInstantUtc(Math.round(sec)).replaceAll(':', '');
  const strips = levels.map(
    ({ stationCode, view }) => `${stationCode}_${instant(view.fromSec)}_${instant(view.toSec)}`,
  );
  return `${strips.join('_beside_')}.${kind}`;
}

function offer(blob: Blob, name: string): void {
  const url = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 1000);
}
