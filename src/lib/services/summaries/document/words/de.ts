import { type Convention } from '#lib/contracts/summaries';
import { type MethodFormat, type MonthWords } from './words';
import { germanLimitText } from './limitsDe';

const METHOD_OF_TONE = {
  survey: 'Übersichtsverfahren, ISO 1996-2:2017 Anhang K',
  'adjacent-pair': 'Paar benachbarter Bänder, Zusatz von Bittern',
};
const BASIS = {
  'class-1': 'Klasse 1',
  'class-2': 'Klasse 2',
  'class-1-assumed': 'Klasse 1 angenommen, keines ist verzeichnet',
};

export const GERMAN: MonthWords = {
  language: 'de',
  tag: 'de-DE',
  decimal: ',',
  sections: {
    stations: 'Messstellen',
    limits: 'Geltende Grenzwerte',
    compliance: 'Einhaltung',
    exceedances: 'Überschreitungen',
    'year-to-date': 'Jahr bis hierher',
    days: 'Tag für Tag',
    'heat-map': 'Stunde und Tag',
    bands: 'Bänder des Monats',
    octaves: 'Oktaven',
    spectrogram: 'Spektrogramm des Monats',
    tonality: 'Töne und tiefe Frequenzen',
    exclusions: 'Was nicht zählt, und was es bewirkt',
    calibrations: 'Kalibrierprüfungen',
    weather: 'Wetter',
    complaints: 'Beschwerden',
    glossary: 'Begriffe',
    method: 'Wie diese Werte entstehen',
    cautions: 'Hinweise',
    'sign-off': 'Unterschriften',
    seal: 'Siegel',
  },
  columns: {
    station: 'Messstelle',
    date: 'Datum',
    figure: 'Größe',
    over: 'Über',
    level: 'Pegel, dB',
    coverage: 'Abdeckung',
    limit: 'Grenzwert',
    compared: 'Verglichen',
    from: 'Von',
    to: 'Bis',
    version: 'Fassung',
    inForce: 'In Kraft',
    state: 'Stand',
    cause: 'Ursache',
    windows: 'Verglichene Fenster',
    exceedances: 'Überschreitungen',
    highest: 'Höchste',
    band: 'Band',
    reason: 'Grund',
    duration: 'Dauer',
    withRules: 'Wie berichtet',
    everything: 'Alles',
    difference: 'Unterschied',
    instrument: 'Gerät',
    checkedAt: 'Geprüft',
    calibrator: 'Kalibrator',
    found: 'Gefunden',
    drift: 'Abweichung',
    source: 'Quelle',
    meanSpeed: 'Mittel',
    maximumSpeed: 'Höchster',
    direction: 'Aus',
    term: 'Begriff',
    meaning: 'Bedeutung',
    quarters: 'Viertelstunden',
  },
  monthName,
  title: (month) => `Lärmbericht ${monthName(month)}`,
  draft: 'Entwurf, nicht herausgegeben',
  revision: (number) => `Fassung ${number}`,
  toDate: 'bis jetzt',
  issued: (name, at) => `Herausgegeben von ${name}, ${at}.`,
  computed: (at) => `Berechnet ${at}; die Werte folgen den Daten von da.`,
  notOver: 'Der Monat oder seine letzte Nacht ist nicht zu Ende: alle Werte gelten bis jetzt.',
  page: (page, pages) => `${page} von ${pages}`,
  contents: 'Inhalt',
  over: {
    days: 'Tage',
    evenings: 'Abende',
    nights: 'Nächte',
    pooled: 'alle Tage, Abende und Nächte',
    month: 'ganzer Monat',
  },
  ofSamples: (seconds) => `ganzer Monat, aus LAeq,${seconds} s`,
  maximumAt: (at) => `im Intervall ab ${at}`,
  belowMinimum: 'Abdeckung unter dem Mindestmaß: zur Kenntnis, nie mit einem Grenzwert verglichen.',
  complaints: ({ open, answered, closed }) => {
    const total = open + answered + closed;
    return total === 0
      ? 'Zu diesem Monat ist keine Beschwerde über Lärm verzeichnet.'
      : `Beschwerden über Lärm, der in diesem Monat begann: ${total}, davon ${answered} beantwortet, ${open} offen, ${closed} ohne Antwort geschlossen.`;
  },
  measuredBy: 'Gemessen mit',
  noInstrument: 'kein Gerät ist verzeichnet',
  bandsAre: (fraction, seconds) => `${fraction === 3 ? 'Terzen' : 'Oktaven'}, alle ${seconds} s`,
  microphone: (metres) => `Mikrofon in ${metres} m Höhe`,
  placements: { 'free-field': 'Freifeld', facade: 'an einer Fassade' },
  correction: (db) => `Korrektur auf den einfallenden Schall ${db} dB, in den Pegeln unten nicht enthalten`,
  stands: (from, to, coverage) => {
    if (from === null && to === null) return null;
    const since = from === null ? '' : `Eingetragen ${from}, innerhalb des Monats. `;
    const until = to === null ? '' : `Außer Dienst ${to}. `;
    return `${since}${until}${coverage === null ? '' : `Abdeckung seit dem Eintrag ${coverage}.`}`.trim();
  },
  noData: 'Für diesen Monat sind keine gültigen Daten dieser Messstelle verzeichnet.',
  none: {
    limits: 'In diesem Monat galt kein Grenzwert.',
    exceedances: 'Für diesen Monat ist keine verzeichnet.',
    exclusions: 'Kein Ausschluss durch den Betreiber berührt diesen Monat.',
    calibrations: 'In diesem Monat ist keine Prüfung mit einem Kalibrator verzeichnet.',
    weather: 'Der Wind wurde nicht gemessen: kein Sensor, kein Mast.',
    leftOut: 'Nichts Gemessenes blieb außer Betracht.',
  },
  more: (count) => `und ${count} weitere, verzeichnet in den Dateien mit Daten.`,
  limitText: germanLimitText,
  compliance: {
    exceeded: 'überschritten',
    'not-exceeded': 'nicht überschritten',
    'not-compared': 'zu wenige Daten zum Vergleich',
  },
  lifted: (count) => `${count} aufgehoben`,
  exceedanceStates: { standing: 'besteht', lifted: 'aufgehoben' },
  causes: {
    plant: 'Anlage',
    loading: 'Verladung',
    'building-works': 'Bauarbeiten',
    vehicles: 'Fahrzeuge',
    rail: 'Bahn',
    vessels: 'Schiffe',
    aircraft: 'Flugzeuge',
    people: 'Menschen',
    weather: 'Wetter',
    animals: 'Tiere',
    instrument: 'Gerät',
    'not-found': 'nicht gefunden',
    other: 'andere',
  },
  noCause: 'noch offen',
  reasons: {
    calibration: 'Kalibrierung',
    selfcheck: 'Selbstprüfung',
    overload: 'Übersteuerung',
    tamper: 'Eingriff',
    powerloss: 'Stromausfall',
    clockset: 'Uhr gestellt',
    wind: 'Wind gemeldet',
    'wind-speed': 'Wind über der Schranke nach dem eigenen Sensor',
    rain: 'Regen von der Messstelle gemeldet',
    exclusion: 'vom Betreiber ausgeschlossen',
    'mast-wind': 'Wind über der Schranke am Mast',
    'mast-rain': 'Regen am Mast',
  },
  ownSensor: 'eigener Sensor der Messstelle',
  mast: (code, name) => `Mast ${code} (${name})`,
  captions: {
    days: 'Die Nacht ist die, die an dem Datum beginnt; LAeq, LA10 bis LA90 und LAFmax sind die des Kalendertags.',
    heatMap:
      'LAeq jeder Stunde der Wanduhr. Schraffiert: Abdeckung unter dem Mindestmaß; leer: keine gültigen Daten.',
    bands: (coverage) =>
      `Unbewertete Pegel: Balken Leq, langer Strich L10, kurzer Strich L90. Abdeckung ${coverage}.`,
    spectrogram: 'Unbewerteter Leq jedes Bandes und jeder Stunde. Weiß: keine gültigen Daten.',
    effect:
      'Dieselben Werte mit und ohne das, was Gültigkeitsregeln und Ausschlüsse weglassen. Weggelassene Daten bleiben verzeichnet.',
    yearToDate: (from, to) => `Von ${from} bis ${to}: alle Energien zusammen, nie Mittel von Monaten.`,
  },
  axes: {
    hour: 'Stunde des Tages',
    date: 'Tag des Monats',
    frequency: 'Nennfrequenz der Bandmitte, Hz',
    noLevel: 'keine gültigen Daten',
  },
  alternatives: {
    heatMap: (station, low, high) =>
      `Karte der stündlichen LAeq an ${station}: die Stunden jedes Tages von ${low} dB bis ${high} dB. Die Pegel stehen in der Stundentabelle der Arbeitsmappe und der CSV-Dateien.`,
    bands: (station) =>
      `Balken der Bandpegel des Monats an ${station} mit L10 und L90; die Tabelle der Bänder hat dieselben Pegel.`,
    spectrogram: (station) => `Bild der stündlichen Bandpegel des Monats an ${station}.`,
    trend: (station) =>
      `Lden, Lday und Lnight jedes Datums an ${station}; die Tabelle der Tage hat dieselben Pegel.`,
  },
  tonality: {
    notAssessable: {
      'no-data': 'Es gibt keine gültigen Daten, in denen Töne zu suchen wären.',
      'octave-bands': 'Nicht beurteilbar: Oktaven zeigen keinen Ton, was nicht heißt, dass keiner da ist.',
      'no-neighbours': 'Nicht beurteilbar: kein Band hat beide Nachbarn.',
      'averaged-too-short': 'Nicht beurteilbar: weniger als 60 s Daten.',
    },
    none: 'Das mittlere Spektrum des Monats zeigt nach dem Übersichtsverfahren keinen Ton.',
    tone: (range, excess, method) =>
      `Ein Ton in ${range} steht im mittleren Spektrum ${excess} dB über seinem lauteren Nachbarn (${METHOD_OF_TONE[method]}). Ein Band nennt einen Bereich, keine Frequenz.`,
    blocks: (tonal, assessed) =>
      assessed === 0
        ? 'Keine Viertelstunde konnte auf Töne geprüft werden.'
        : `Von ${assessed} Viertelstunden, jede nach ihrem mittleren Spektrum, zeigen ${tonal} einen Ton nach dem Übersichtsverfahren.`,
    lowFrequency: (difference, bound, isAbove) =>
      `LCeq − LAeq des Monats ist ${difference} dB, ${isAbove ? 'über' : 'nicht über'} der Schranke von ${bound} dB.`,
    lowFrequencyBlocks: (above, assessed) =>
      `Von ${assessed} Viertelstunden mit beiden Pegeln liegen ${above} über der Schranke.`,
    noLowFrequency: 'Tiefe Frequenzen sind nicht zu beurteilen: kein LCeq wurde gemessen.',
  },
  uncertainty: ({ instrument, basis, drift, driftKnown, gaps }, format) =>
    `U ist die erweiterte Messunsicherheit, U = 2u (ISO 1996-2), aus Gerät ${format(instrument)} dB (${BASIS[basis]}), Abweichung bei Prüfungen ` +
    `${format(drift)} dB${driftKnown === 'both' ? '' : ' (Prüfungen schließen den Monat nicht ein)'} und, für LAeq, Lücken ${gaps === null ? 'unbekannter Größe' : `${format(gaps)} dB`}. Ort, Wetter und Quelle sind nicht darin.`,
  method: (doc, format) => [
    ...doc.conventions.flatMap((convention) => conventionSentences(convention, format)),
    'Eine Nacht gehört zu dem Datum, an dem sie beginnt. Lday, Levening, Lnight und Lden des Monats und des Jahres bis hierher fassen die ' +
      'Zeiträume zusammen, die darin beginnen; Lnight enthält also die ersten Stunden des nächsten Monats und nicht die seines eigenen ersten ' +
      'Morgens. LAeq, LAFmax, die statistischen Pegel und die Bänder gehen nach der Uhr. Beides sind nicht dieselben Stunden.',
    ...(format.clockChange === null
      ? []
      : [
          `Die Uhr wird am ${format.clockChange.at} umgestellt; dieses Datum hat ${format.clockChange.hours} Stunden, und die Nacht, in die die Umstellung fällt, ist länger oder kürzer als ihre Nennstunden.`,
        ]),
    'Pegel eines Zeitraums sind Energiemittel allein über die gültige Zeit: erst kommen alle Energien zusammen, dann wird Lden einmal daraus ' +
      'berechnet, mit den Nennstunden von Tag, Abend und Nacht. Ein Datum, dem ein ganzer Zeitraum fehlt, hat kein Lden. Wechselten die ' +
      'Zeiträume innerhalb des Monats, so hat er kein Lden.',
    'Statistische Pegel (LA10, LA50, LA90 und die der Bänder) stammen aus den LAeq der einzelnen Intervalle, kaufmännisch auf 0,1 dB gerundet, ab ' +
      '30 Werten, und gar nicht, wo die Länge der Intervalle wechselte. Sie werden nie gemittelt; die der Oktaven stammen aus den Terzsummen ' +
      'jedes Intervalls.',
    'Abdeckung ist die gültige Zeit durch die verstrichene Zeit, wann immer die Messstelle eingetragen wurde. † kennzeichnet einen Wert, dessen ' +
      'Abdeckung unter dem Mindestmaß liegt: er steht zur Kenntnis und wird nicht mit einem Grenzwert verglichen. Fehlende Daten sind keine Stille.',
    'Überschreitungen stehen in dem Kalendermonat, in dem ihr Fenster beginnt, beurteilt nach der dann geltenden Fassung des Grenzwerts: der ' +
      'Pegel, kaufmännisch auf Zehntel gerundet, ist größer. Was spätere Daten oder ein Ausschluss darunter brachten, ist als aufgehoben ' +
      'verzeichnet. „Nicht überschritten“ gilt für die Fenster, die genug Daten zum Vergleich hatten, für keine anderen.',
    'Die Unsicherheit eines Pegels vereint die Klasse des Geräts, die Abweichung bei Kalibrierprüfungen und den Anteil der Lücken, ' +
      '4,34·s/m·((1 − c)/n)^0,5 über die n stündlichen Energien (Mittel m, Streuung s, Abdeckung c), was zufällige Lücken annimmt. Die von Lden wägt Tag, Abend und Nacht nach ihrem ' +
      'Anteil an der Energie und nimmt deren Lücken als unabhängig. Die des Jahres bis hierher entsteht ebenso, aus allen seinen Stunden, Prüfungen und Geräten.',
    'Töne werden im mittleren Spektrum des Monats und jeder Viertelstunde gesucht, nach dem Übersichtsverfahren der ISO 1996-2:2017 Anhang K. Ein Mittel über einen Monat verbirgt Töne, die kommen und gehen.',
    'Pegel sind hier einmal kaufmännisch auf 0,1 dB gerundet; die Dateien mit Daten enthalten sie ungerundet. Grenzwerte tragen die Namen, unter denen sie eingetragen sind.',
  ],
  cautions: [
    'Pegel beschreiben die Orte der Messstellen, wie sie aufgestellt sind, nicht die Belastung einer Person oder den Pegel an einer Wohnung.',
    'Richtwerte zur Gesundheit sind zum Vergleich da, sie sind keine Grenzwerte.',
    'Dieser Bericht stützt ein fachliches Urteil und ersetzt es nicht: örtliches Recht, Genehmigungen und die zuständige Behörde entscheiden.',
  ],
  glossary: [
    ['dB', 'Dezibel re 20 µPa. 10 dB mehr sind das Zehnfache der Energie.'],
    [
      'LAeq',
      'Äquivalenter Dauerschallpegel: der gleichbleibende Pegel mit derselben A-bewerteten Energie in derselben Zeit.',
    ],
    ['Lday', 'LAeq der Tage.'],
    ['Levening', 'LAeq der Abende.'],
    ['Lnight', 'LAeq der Nächte; eine Nacht gehört zu dem Datum, an dem sie beginnt.'],
    [
      'Lden',
      'Tag-Abend-Nacht-Pegel, Richtlinie 2002/49/EG Anhang I: Abende mit 5 dB, Nächte mit 10 dB Zuschlag.',
    ],
    ['LA10', 'In 10 % der gültigen Zeit überschrittener Pegel: der lauteren Augenblicke.'],
    ['LA90', 'In 90 % der gültigen Zeit überschrittener Pegel: des Hintergrunds.'],
    ['LAFmax', 'Höchster Pegel mit Zeitbewertung F.'],
    ['Leq', 'Äquivalenter Pegel eines Bandes, unbewertet.'],
    ['LCeq', 'Äquivalenter Pegel mit C-Bewertung, in der tiefe Frequenzen mehr zählen.'],
    ['Abdeckung', 'Anteil der Zeit, für die es gültige Daten gibt.'],
    ['U', 'Erweiterte Messunsicherheit: der wahre Pegel liegt mit etwa 95 % Vertrauen innerhalb von ± U.'],
  ],
  signOff: {
    prepared: 'Erstellt von, Datum',
    reviewed: 'Geprüft von, Datum',
    issued: 'Herausgegeben von, Datum',
  },
  seal: {
    digest: 'SHA-256 der verwendeten Daten',
    year: 'SHA-256 der Summen der Monate davor, für das Jahr bis hierher',
    software: 'Version der Software',
    key: 'Öffentlicher Schlüssel des Netzes',
    chain: 'Kopf der Prüfkette',
    verify: 'Ob eine Datei die herausgegebene ist, sagt',
  },
};

function monthName(month: string): string {
  return new Intl.DateTimeFormat('de-DE', { month: 'long', year: 'numeric', timeZone: 'UTC' }).format(
    Date.parse(`${month}-01T00:00:00Z`),
  );
}

function conventionSentences(convention: Convention, { instant, coverage }: MethodFormat): string[] {
  const { from, day, evening, night, minimumCoverage, maximumWindSpeed, excludeRain, timeZone } = convention;
  const since = from === null ? '' : `Ab ${instant(from)}: `;
  const periods =
    evening === null ? `Tag ${day}–${night}` : `Tag ${day}–${evening}, Abend ${evening}–${night}`;
  return [
    `${since}Zeiten sind bürgerliche Zeiten der Zone ${timeZone}; ${periods}, Nacht ${night}–${day}. Die Mindestabdeckung ist ${coverage(minimumCoverage)}.`,
    `${since}Intervalle zählen nicht, wenn das Gerät Kalibrierung, Selbstprüfung, Übersteuerung, Eingriff, Stromausfall, eine gestellte Uhr ` +
      `oder Wind meldet, bei Wind über ${maximumWindSpeed} m/s${excludeRain ? ', bei Regen' : ''}, und wo ein Betreiber die Zeit mit Grund ` +
      'ausgeschlossen hat. Sie bleiben verzeichnet.',
  ];
}
