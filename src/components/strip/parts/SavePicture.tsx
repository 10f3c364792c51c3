import { useState } from 'react';
import { formatInstantUtc } from '#lib/contracts/common';
import { readPalette } from '../draw/palette';
import { type Sheet } from '../export/drawSheet';
import { pngOfSheet, svgOfSheet, type SheetOrder } from '../export/exportSheet';

interface SavePictureProps {
  stationCode: string;
  sheet: Sheet;
  ratio: number;
  summary: string;
}

const KINDS = ['png', 'svg'] as const;

/** Saves what the strip shows as a picture that explains itself: with station, period, zone, legend and limits. */
export function SavePicture({ stationCode, sheet, ratio, summary }: SavePictureProps) {
  const [problem, setProblem] = useState<string | null>(null);
  const save = async (kind: (typeof KINDS)[number]) => {
    const order: SheetOrder = { sheet, ratio, summary, palette: readPalette(document.body) };
    try {
      offer(kind === 'png' ? await pngOfSheet(order) : svgOfSheet(order), fileName(stationCode, sheet, kind));
      setProblem(null);
    } catch (error) {
      setProblem(error instanceof Error ? error.message : 'The picture cannot be made.');
    }
  };
  return (
    <div className="flex flex-wrap items-center gap-1.5 text-small" data-screen-only="">
      <span className="text-ink-soft">Save picture</span>
      {KINDS.map((kind) => (
        <button
          key={kind}
          type="button"
          className="button button-small"
          aria-label={`Save picture as ${kind.toUpperCase()}`}
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

function fileName(code: string, { picture: { view } }: Sheet, kind: string): string {
  const instant = (sec: number) => formatInstantUtc(Math.round(sec)).replaceAll(':', '');
  return `${code}_${instant(view.fromSec)}_${instant(view.toSec)}.${kind}`;
}

function offer(blob: Blob, name: string): void {
  const url = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 1000);
}
