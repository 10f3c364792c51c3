/** The range of levels in dB that the map's colours span: a quiet night to a loud yard. */
export const MAP_LEVEL_RANGE = { lowDb: 30, highDb: 85 } as const;
