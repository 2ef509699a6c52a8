/** The chart's layers from the coast up, with the height at which each is painted; station marks lie above them all. */
export const PANES = {
  bands: 300,
  overlap: 310,
  rings: 320,
  sight: 330,
  regions: 340,
  crossings: 350,
  sources: 360,
} as const;
