/** Standard acceleration of free fall (m/s2), 3rd CGPM 1901. The one place that defines it; settings may replace it. */
export const STANDARD_GRAVITY = 9.80665;
