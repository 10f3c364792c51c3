import { type TroubleKind } from './health';
import { type StationState } from './stations';

/** Columns that a list of stations can have, in their order. */
export const STATION_COLUMN_KEYS = [
  'station',
  'state',
  'troubles',
  'newest',
  'laeq',
  'lafmax',
  'la90',
  'coverage',
  'lastPost',
  'battery',
  'interval',
  'bands',
  'placement',
  'height',
  'latitude',
  'longitude',
  'registered',
] as const;
export type StationColumnKey = (typeof STATION_COLUMN_KEYS)[number];

export interface StationColumn {
  label: string;
  unit?: string;
  /** Numbers stand right-aligned. */
  isNumber?: true;
  /** Shown only when chosen. */
  isOptional?: true;
}

export const STATION_COLUMNS: Readonly<Record<StationColumnKey, StationColumn>> = {
  station: { label: 'Station' },
  state: { label: 'State' },
  troubles: { label: 'Troubles' },
  newest: { label: 'Newest LAeq', unit: 'dB', isNumber: true },
  laeq: { label: 'LAeq', unit: 'dB', isNumber: true },
  lafmax: { label: 'LAFmax', unit: 'dB', isNumber: true },
  la90: { label: 'LA90', unit: 'dB', isNumber: true },
  coverage: { label: 'Coverage', isNumber: true },
  lastPost: { label: 'Last post', isNumber: true },
  battery: { label: 'Battery', unit: 'V', isNumber: true },
  interval: { label: 'Interval', isNumber: true, isOptional: true },
  bands: { label: 'Bands', isOptional: true },
  placement: { label: 'Microphone', isOptional: true },
  height: { label: 'Height', unit: 'm', isNumber: true, isOptional: true },
  latitude: { label: 'Latitude', unit: '°', isNumber: true, isOptional: true },
  longitude: { label: 'Longitude', unit: '°', isNumber: true, isOptional: true },
  registered: { label: 'Registered', isOptional: true },
};

/** Which stations a list shows by what they are doing; `in-use`: all but the retired ones. */
export type StateChoice = StationState | 'in-use' | 'all';

/** Which stations a list shows by their health: with any open trouble, with none, or with one kind of it. */
export type HealthChoice = 'any' | 'trouble' | 'fine' | TroubleKind;

/** What a list of stations is narrowed to and how it is arranged. */
export interface StationListChoice {
  /** Part of name, code or surroundings; empty: all. */
  text: string;
  state: StateChoice;
  health: HealthChoice;
  sort: { column: StationColumnKey; isDescending: boolean };
  /** Shown, in their order; the station itself always is. */
  columns: readonly StationColumnKey[];
}
