/** Lowest level that is stored, in hundredths of a dB (−30.0 dB re 20 µPa). */
export const MIN_LEVEL_CENTI_DB = -3000;

/** Highest level that is stored, in hundredths of a dB (200.0 dB re 20 µPa). */
export const MAX_LEVEL_CENTI_DB = 20000;

/** Three bands at the highest level sum to 4.77 dB more: sums of stored bands stay below this. */
export const MAX_SUM_CENTI_DB = MAX_LEVEL_CENTI_DB + 480;

/** The stored value that means "the monitor gave no level here" (the lowest int16). */
export const NO_LEVEL_CENTI_DB = -32768;
