/**
 * Whether a request's Host is a name of this server: a loopback one, or the one it was told to listen at. A page
 * elsewhere can point a name of its own at this machine after it was loaded, and would then read the answers as its own;
 * its requests still carry that name. Where the server listens at all addresses (0.0.0.0 or ::) any address in figures
 * will do, since only a name can be pointed elsewhere.
 */
export function isOwnHost(host: string | null, listensAt: string): boolean {
  const asked = hostName(host ?? "");
  if (asked === null) return false;
  if (asked === "localhost" || asked === "[::1]" || /^127\.\d+\.\d+\.\d+$/.test(asked)) return true;
  const own = hostName(listensAt.includes(":") ? `[${listensAt}]` : listensAt);
  if (own === "0.0.0.0" || own === "[::]") return asked.startsWith("[") || /^\d+\.\d+\.\d+\.\d+$/.test(asked);
  return asked === own;
}

/** In the form in which two spellings of one host are alike, without its port; null where it is none. */
function hostName(host: string): string | null {
  if (!/^[\w.:[\]-]+$/.test(host)) return null;
  try {
    return new URL(`http://${host}`).hostname;
  } catch {
    return null;
  }
}
