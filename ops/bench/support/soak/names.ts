export const SOAK_NETWORK = 'soak';
export const SOAK_PERSON = 'soak@bench.example';
/** Stations to which files are brought; no monitor posts for them. */
export const CARD_STATIONS = ['CARD-1', 'CARD-2', 'CARD-3'];
