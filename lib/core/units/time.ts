export const SECONDS_PER_HOUR = 3600;
export const SECONDS_PER_DAY = 86_400;
