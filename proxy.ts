import { NextResponse } from "next/server";
import type { NextRequest } from "next/server";

/**
 * Gives each page a content security policy with a nonce of its own, so that only scripts that this server sent can
 * run. `style-src-attr` is open because the chart places its layers by style attributes. Everything else, the base map
 * and the calculation's worker among it, comes from this server and from nowhere else.
 */
export function proxy(request: NextRequest): NextResponse {
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

// The programming interface stays outside: behind a proxy, a body of more than 10 MB is cut and still answered 200.
export const config = {
  matcher: [{ source: "/((?!api/|_next/|favicon|land/).*)" }],
};
