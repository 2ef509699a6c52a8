/**
 * Latitude and longitude in degrees, in the order in which the map library takes them. Longitudes run on past 180, so
 * that a line across the antimeridian has no jump. Pairs live in this room only; everything else says `Position`.
 */
export type ChartPoint = [latitudeDegrees: number, longitudeDegrees: number];

/** Points in order, joined by straight strokes on the chart. */
export type ChartLine = ChartPoint[];

/** The outer line of an area, then its holes. */
export type ChartPolygon = ChartLine[];

/** Everything that is painted with one brush: one stroke of it shows no seam between its parts. */
export type ChartArea = ChartPolygon[];
