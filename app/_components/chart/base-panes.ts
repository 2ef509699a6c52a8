/** What lies under everything else on a chart, with the height at which each is painted. */
export const BASE_PANES = {
  graticule: 205,
  land: 210,
  coast: 220,
} as const;
