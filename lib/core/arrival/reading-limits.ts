/**
 * Wide of every wave that a station of any kind hears, and of every error of a time; what lies outside is a slip of
 * unit or of the decimal point.
 */
export const PERIOD_SECONDS = { least: 0.5, most: 1000 };
export const FREQUENCY_HZ = { least: 0.001, most: 2 };
/** Zero is taken as well, where the other of time and frequency has an error. */
export const ARRIVAL_SIGMA_SECONDS = { least: 0.001, most: 30 * 86_400 };
