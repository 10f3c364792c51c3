/** Size of a station's slip on the map, CSS pixels. */
export const SLIP_SIZE = { width: 108, height: 41 };
