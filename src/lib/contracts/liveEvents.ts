// Apart from the schema, so that a page that listens need not fetch a validator.

/** Name of the event that carries a `LiveInterval` as JSON. */
export const LIVE_EVENT = 'interval';
/** Name of the event after which the server ends the stream because the listener may not hear it any longer. */
export const LIVE_OVER_EVENT = 'over';
