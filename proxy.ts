import { NextResponse } from "next/server";
import type { NextRequest } from "next/server";
import { isOwnHost } from "#lib/http/own-host.ts";

/**
 * Gives each page a content security policy with a nonce of its own, so that only scripts that this server sent can
 * run. `style-src-attr` is open because the chart places its layers by style attributes. Everything else, the base map
 * and the calculation's worker among it, comes from this server and from nowhere else. Requests for another host, and
 * addresses that are no text, are turned away.
 */
export function proxy(request: NextRequest): NextResponse {
  if (request.nextUrl.pathname.startsWith("/api/")) return isText(request.nextUrl.pathname) ? NextResponse.next() : wrongAddress();
  if (!isOwnHost(request.headers.get("host"), process.env.OFFING_HOST ?? "127.0.0.1")) {
    return refused(421, "This server answers under the name that it was started with (npm start -- --host H), and on its own machine as localhost.");
  }
  if (!isText(request.nextUrl.pathname)) return refused(400, "The address holds a percent sign that spells no letter.");
  const nonce = btoa(crypto.randomUUID());
  const policy = [
    "default-src 'self'",
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'`,
    "style-src 'self' 'unsafe-inline'",
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "worker-src 'self' blob:",
    "connect-src 'self'",
    "object-src 'none'",
    "base-uri 'none'",
    "form-action 'self'",
    "frame-ancestors 'none'",
  ].join("; ");

  const headers = new Headers(request.headers);
  headers.set("x-nonce", nonce);
  headers.set("content-security-policy", policy);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set("content-security-policy", policy);
  return response;
}

/** In the words and the shape of the programming interface. */
function wrongAddress(): NextResponse {
  return NextResponse.json({ issues: [{ code: "address", path: "", message: "The address holds a percent sign that spells no letter." }] }, { status: 400 });
}

function refused(status: number, sentence: string): NextResponse {
  return new NextResponse(`${sentence}\n`, { status, headers: { "content-type": "text/plain; charset=utf-8" } });
}

function isText(pathname: string): boolean {
  try {
    decodeURIComponent(pathname);
    return true;
  } catch {
    return false;
  }
}

// The programming interface stays outside: behind a proxy, a body of more than 10 MB is cut and still answered 200. Of
// its addresses those with a percent sign in an id come by here all the same, to be turned away where that spells no
// letter: Next itself would take them for a fault. No operation on one thing takes bodies of that size.
export const config = {
  matcher: [{ source: "/((?!api/|_next/|favicon|land/).*)" }, { source: "/api/v1/([^/]+)/(.*%.*)" }],
};
