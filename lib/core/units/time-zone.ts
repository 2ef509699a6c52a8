/** Whether this machine's calendar knows a time zone by this IANA name, in capital or small letters. */
export function isTimeZone(zone: string): boolean {
  try {
    return new Intl.DateTimeFormat("en", { timeZone: zone }).resolvedOptions().timeZone !== "";
  } catch {
    return false;
  }
}
