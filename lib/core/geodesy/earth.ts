/** Mean radius of the WGS84 ellipsoid, (2a + b) / 3 (m), for what is worked out on a sphere. */
export const MEAN_RADIUS_METRES = 6_371_008.8;

/**
 * Half the length of a meridian ellipse of WGS84 (m), the distance from pole to pole: no two points lie further apart
 * along a geodesic. Twice the quadrant of 10 001 965.7293 m, rounded up so that no distance exceeds it.
 * [source: karney-2013]
 */
export const HALF_GIRTH_METRES = 20_003_931.4587;
