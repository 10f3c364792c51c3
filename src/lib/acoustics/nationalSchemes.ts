import { CNEL_SCHEME, DEFAULT_SCHEME, LDN_SCHEME, type PeriodScheme } from './dayEveningNight';

/** How well a preset's source is known: read in the rule itself, in a text about it, or only remembered. */
export type SourceStatus = 'verified' | 'secondary' | 'from memory';

/** Period hours in use somewhere, to start a network's settings from. Local rules decide: check them. */
export interface NationalScheme {
  key: string;
  label: string;
  scheme: PeriodScheme;
  source: string;
  status: SourceStatus;
}

function hours(day: number, evening: number | null, night: number): PeriodScheme {
  return {
    dayStartMin: day * 60,
    eveningStartMin: evening === null ? null : evening * 60,
    nightStartMin: night * 60,
  };
}

/** National presets of day, evening and night, with their sources (reference/levels.json "periods"). */
export const NATIONAL_SCHEMES: readonly NationalScheme[] = [
  {
    key: 'eu',
    label: 'European Union (default)',
    scheme: DEFAULT_SCHEME,
    source: 'Directive 2002/49/EC Annex I 1',
    status: 'verified',
  },
  { key: 'de', label: 'Germany', scheme: hours(6, 18, 22), source: '34. BImSchV § 2', status: 'verified' },
  {
    key: 'fr',
    label: 'France',
    scheme: hours(6, 18, 22),
    source: 'a public explanation of Lden in French',
    status: 'secondary',
  },
  {
    key: 'it',
    label: 'Italy',
    scheme: hours(6, 20, 22),
    source: 'D.Lgs. 194/2005 all. 1',
    status: 'verified',
  },
  {
    key: 'es',
    label: 'Spain',
    scheme: hours(7, 19, 23),
    source: 'RD 1367/2007 Annex I A.1',
    status: 'secondary',
  },
  {
    key: 'nl',
    label: 'Netherlands',
    scheme: hours(7, 19, 23),
    source: 'a public explanation of Lden in Dutch',
    status: 'secondary',
  },
  {
    key: 'dk',
    label: 'Denmark (road, rail)',
    scheme: hours(7, 19, 22),
    source: 'Halsnæs kommuneplan bilag 4',
    status: 'secondary',
  },
  {
    key: 'ie',
    label: 'Ireland (industry, NG4)',
    scheme: hours(7, 19, 23),
    source: 'EPA NG4 guidance',
    status: 'secondary',
  },
  {
    key: 'uk',
    label: 'United Kingdom (Lden)',
    scheme: hours(7, 19, 23),
    source: 'Environmental Noise Regulations 2006',
    status: 'from memory',
  },
  {
    key: 'uk-bs4142',
    label: 'United Kingdom (BS 4142, no evening)',
    scheme: hours(7, null, 23),
    source: 'BS 4142 as quoted in a public planning report',
    status: 'secondary',
  },
  {
    key: 'us-dnl',
    label: 'United States (Ldn, no evening)',
    scheme: LDN_SCHEME,
    source: '14 CFR 150, as quoted in public',
    status: 'secondary',
  },
  {
    key: 'us-ca',
    label: 'California (CNEL)',
    scheme: CNEL_SCHEME,
    source: 'ASA term 3.20 CNEL',
    status: 'verified',
  },
  {
    key: 'se',
    label: 'Sweden',
    scheme: hours(6, 18, 22),
    source: 'Förordning 2004:675',
    status: 'from memory',
  },
  { key: 'at', label: 'Austria', scheme: hours(6, 19, 22), source: 'Bundes-LärmV', status: 'from memory' },
  {
    key: 'pt',
    label: 'Portugal',
    scheme: hours(7, 20, 23),
    source: 'RGR DL 9/2007, as quoted in public',
    status: 'secondary',
  },
  { key: 'fi', label: 'Finland', scheme: hours(7, 19, 22), source: 'VNa 801/2004', status: 'from memory' },
];
