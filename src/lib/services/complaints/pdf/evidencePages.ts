import type { Content } from 'pdfmake/interfaces';
import type { StationEvidence } from '#lib/contracts/complaintEvidence';
import type { PackItem } from '#lib/contracts/evidencePack';
import { formatPeriod, formatZone } from '#lib/format/times';
import { heading, paragraph, SMALL_SIZE, SOFT_INK, typeset } from '../../summaries/pdf/typography';
import { instantSec } from '../letter/instants';
import type { PrintedLetter } from './letterPdf';
import { levelsTable, limitsTable, stationsTable, usualTable } from './figureTables';
import {
  elsewhereSection,
  exceedancesSection,
  exclusionsSection,
  reportsSection,
  weatherSection,
} from './findings';
import { spectrumChartSvg } from './spectrumChart';
import { soundSection } from './soundSection';
import { stripChartSvg } from './stripChart';

type Sections = Record<PackItem, () => Content[]>;

/** The evidence that goes with a letter, item by item; nothing where every item was dropped. */
export function evidencePages({ pack, items, reference }: PrintedLetter): Content[] {
  if (items.length === 0) return [];
  const { evidence } = pack;
  const zone = evidence.timeZone;
  const window = { fromSec: instantSec(evidence.from), toSec: instantSec(evidence.to) };
  const [nearest] = evidence.stations;
  const sections: Sections = {
    stations: () => stationsTable(pack),
    levels: () => levelsTable(evidence),
    limits: () => limitsTable(evidence),
    usual: () => usualTable(evidence),
    strip: () => stripSection(pack.strip && stripChartSvg(pack.strip, zone), nearest),
    spectrum: () => spectrumSection(nearest),
    tones: () => (nearest ? soundSection(nearest) : []),
    plants: () => plantsSection(nearest),
    exceedances: () => exceedancesSection(evidence),
    exclusions: () => exclusionsSection(evidence),
    weather: () => weatherSection(evidence),
    reports: () => reportsSection(pack.reports),
    elsewhere: () => elsewhereSection(pack.elsewhere, zone),
  };
  return [
    {
      text: 'The measurements behind this letter',
      bold: true,
      fontSize: 15,
      pageBreak: 'before',
      margin: [0, 0, 0, 2],
    },
    {
      text: `${reference} · ${formatPeriod(window, zone)} · ${formatZone(zone, window)}`,
      color: SOFT_INK,
      margin: [0, 0, 0, 2],
    },
    ...items.flatMap((item) => sections[item]()),
    {
      ...typeset(
        'Levels in dB re 20 µPa, as the monitors measured them where they stand; they describe those places and not your home. ' +
          `Digest of these figures: ${evidence.digest}.`,
        SMALL_SIZE,
      ),
      color: SOFT_INK,
      margin: [0, 14, 0, 0],
    },
  ];
}

function stripSection(svg: string | null, nearest: StationEvidence | undefined): Content[] {
  if (!nearest) return [];
  if (svg === null)
    return [heading('Over time'), paragraph(`${nearest.name} measured nothing around that time.`)];
  return [
    {
      stack: [
        heading('Over time'),
        caption(
          `${nearest.name}: bands upward, darker is louder; below, the level of each step. The lines enclose the time of the ` +
            'report. Hatched: nothing was measured; grey: measured, not counted.',
        ),
        { svg, margin: [0, 4, 0, 0] } as Content,
      ],
      unbreakable: true,
    },
  ];
}

function spectrumSection(nearest: StationEvidence | undefined): Content[] {
  const context = nearest?.context;
  const svg = context ? spectrumChartSvg(context) : null;
  if (!nearest || svg === null) return [];
  return [
    {
      stack: [
        heading('The spectrum'),
        caption(
          `${nearest.name}, unweighted levels averaged over the time of the report: bars; the ticks are the middle of the same ` +
            'weekday and hours of the weeks before. Bands that stand out among their neighbours are darker.',
        ),
        { svg, margin: [0, 4, 0, 0] } as Content,
      ],
      unbreakable: true,
    },
  ];
}

function plantsSection(nearest: StationEvidence | undefined): Content[] {
  const plants = nearest?.context?.plants ?? [];
  return [
    heading('Plant that could be the source'),
    ...(plants.length === 0
      ? [paragraph('No registered plant is a candidate by what stands out.')]
      : [
          paragraph('Candidates by frequency and schedule; being named here is not a finding.'),
          {
            ul: plants.map(({ name, reason }) => ({
              ...typeset(`${name}: ${reason}.`),
              margin: [0, 0, 0, 2],
            })),
          } as Content,
        ]),
  ];
}

function caption(text: string): Content {
  return { ...typeset(text, SMALL_SIZE), color: SOFT_INK };
}
