export const SECONDS_PER_HOUR = 3600;
