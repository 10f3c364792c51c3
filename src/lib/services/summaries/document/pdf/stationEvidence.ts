import { formatHzRange } from '#lib/format/plants';
import { type DocumentStation } from '#lib/contracts/monthDocument';
import { RUST, SMALL, SOFT_INK } from './fonts';
import { shows, type PdfGround } from './ground';
import { table } from './table';

/** Exceedances that a station’s list shows in print; the files with data carry them all. */
const MOST_PRINTED = 120;
const CAPTION = { size: SMALL + 0.5, colour: SOFT_INK };

/** What stands behind a station’s figures: tones, what was left out, calibrations, weather. */
export function stationEvidence(ground: PdfGround, station: DocumentStation): void {
  const isMeasured = station.figures.LAeq !== null;
  if (shows(ground, 'tonality') && isMeasured) tonality(ground, station);
  const isTouched =
    isMeasured || station.exclusions.items.length > 0 || station.exclusions.leftOut.length > 0;
  if (shows(ground, 'exclusions') && isTouched) exclusions(ground, station);
  if (shows(ground, 'calibrations')) calibrations(ground, station);
  if (shows(ground, 'weather')) weather(ground, station);
}

/** A station’s exceedances with their causes. */
export function exceedances(
  { pages, words, format }: PdfGround,
  { exceedances: { items } }: DocumentStation,
): void {
  pages.heading(3, words.sections.exceedances, { keep: 30 });
  if (items.length === 0) {
    pages.paragraph(words.none.exceedances);
    return;
  }
  const { columns } = words;
  table(
    pages,
    [
      { head: columns.from, align: 'left' },
      { head: columns.limit, align: 'left', width: 'wide' },
      { head: columns.compared, align: 'left', width: 'wide' },
      { head: columns.level },
      { head: columns.limit },
      { head: columns.coverage },
      { head: columns.state, align: 'left' },
      { head: columns.cause, align: 'left', width: 'wide' },
    ],
    items
      .slice(0, MOST_PRINTED)
      .map((item) => [
        format.shortInstant(item.from),
        item.limit,
        words.limitText(item.metric),
        { text: format.value(item.level, item.unit), ...(item.state === 'standing' ? { colour: RUST } : {}) },
        format.value(item.threshold, item.unit),
        format.coverage(item.coverage),
        words.exceedanceStates[item.state],
        item.cause === null
          ? (item.causeDetail ?? words.noCause)
          : [words.causes[item.cause], ...(item.causeDetail === null ? [] : [item.causeDetail])].join(': '),
      ]),
    { size: 8 },
  );
  const more = items.length - MOST_PRINTED;
  if (more > 0) pages.paragraph(words.more(more));
}

function tonality({ pages, words, format }: PdfGround, station: DocumentStation): void {
  const { tonality: tones, lowFrequency } = station;
  pages.heading(3, words.sections.tonality, { keep: 40 });
  if (tones.notAssessable !== null) {
    pages.paragraph(words.tonality.notAssessable[tones.notAssessable], {}, 2);
  } else if (tones.tones.length === 0) {
    pages.paragraph(words.tonality.none, {}, 2);
  }
  for (const { lowerHz, upperHz, excess, method } of tones.tones) {
    pages.paragraph(
      words.tonality.tone(formatHzRange(lowerHz, upperHz), format.level(excess), method),
      {},
      2,
    );
  }
  if (tones.notAssessable !== 'octave-bands') {
    pages.paragraph(words.tonality.blocks(tones.tonalBlocks, tones.assessedBlocks), {}, 2);
  }
  if (tones.bands.length > 0) {
    const { columns } = words;
    const shown = tones.bands.slice(0, 12);
    table(
      pages,
      [{ head: columns.band, align: 'left' }, { head: columns.quarters }],
      shown.map(({ nominalHz, blocks }) => [`${nominalHz} Hz`, String(blocks)]),
      { size: 8, width: 160 },
    );
  }
  if (lowFrequency.difference === null) {
    pages.paragraph(words.tonality.noLowFrequency);
    return;
  }
  const { difference, bound, isAbove, assessedBlocks, blocksAbove } = lowFrequency;
  const month = words.tonality.lowFrequency(format.level(difference), format.number(bound, 0), isAbove);
  pages.paragraph(`${month} ${words.tonality.lowFrequencyBlocks(blocksAbove, assessedBlocks)}`);
}

function exclusions({ pages, words, format }: PdfGround, station: DocumentStation): void {
  const { items, leftOut, figures } = station.exclusions;
  const { columns } = words;
  pages.heading(3, words.sections.exclusions, { keep: 60 });
  pages.paragraph(words.captions.effect, CAPTION, 3);
  if (leftOut.length === 0) {
    pages.paragraph(words.none.leftOut);
  } else {
    table(
      pages,
      [{ head: columns.reason, align: 'left', width: 'wide' }, { head: columns.duration }],
      leftOut.map(({ reason, seconds }) => [words.reasons[reason], format.duration(seconds)]),
      { size: 8, width: 330 },
    );
    table(
      pages,
      [
        { head: columns.figure, align: 'left' },
        { head: columns.withRules },
        { head: columns.everything },
        { head: columns.difference },
      ],
      figures.map(({ quantity, valid, all, difference }) => [
        quantity,
        format.level(valid),
        format.level(all),
        format.difference(difference),
      ]),
      { size: 8, width: 330 },
    );
  }
  if (items.length === 0) {
    pages.paragraph(words.none.exclusions);
    return;
  }
  table(
    pages,
    [
      { head: columns.from, align: 'left' },
      { head: columns.to, align: 'left' },
      { head: columns.reason, align: 'left', width: 'wide' },
    ],
    items.map(({ from, to, reason }) => [format.shortInstant(from), format.shortInstant(to), reason]),
    { size: 8, rowHeads: 2 },
  );
}

function calibrations({ pages, words, format }: PdfGround, station: DocumentStation): void {
  const { columns } = words;
  pages.heading(3, words.sections.calibrations, { keep: 30 });
  if (station.calibrations.length === 0) {
    pages.paragraph(words.none.calibrations);
    return;
  }
  table(
    pages,
    [
      { head: columns.checkedAt, align: 'left' },
      { head: columns.instrument, align: 'left' },
      { head: columns.calibrator, align: 'left', width: 'wide' },
      { head: columns.level },
      { head: columns.found },
      { head: columns.drift },
    ],
    station.calibrations.map((check) => [
      format.shortInstant(check.checkedAt),
      check.serialNumber,
      check.calibrator,
      format.number(check.calibratorLevel, 2),
      format.number(check.before, 2),
      { text: format.number(check.drift, 2), ...(check.isWithinBound ? {} : { colour: RUST, bold: true }) },
    ]),
    { size: 8 },
  );
}

function weather({ pages, words, format }: PdfGround, station: DocumentStation): void {
  const { columns } = words;
  pages.heading(3, words.sections.weather, { keep: 30 });
  if (station.wind.length === 0) {
    pages.paragraph(words.none.weather);
    return;
  }
  table(
    pages,
    [
      { head: columns.source, align: 'left', width: 'wide' },
      { head: columns.from, align: 'left' },
      { head: columns.to, align: 'left' },
      { head: `${columns.meanSpeed}, m/s` },
      { head: `${columns.maximumSpeed}, m/s` },
      { head: `${columns.direction}, °` },
      { head: columns.duration },
    ],
    station.wind.map((source) => [
      source.mast === null ? words.ownSensor : words.mast(source.mast.code, source.mast.name),
      format.shortInstant(source.from),
      format.shortInstant(source.to),
      format.number(source.meanSpeed, 1),
      format.number(source.maximumSpeed, 1),
      format.number(source.direction, 0),
      format.duration(source.seconds),
    ]),
    { size: 8 },
  );
}
