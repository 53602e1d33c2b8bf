import { NextResponse, type NextRequest } from "next/server";

/** Headers for every document, and a first look at where a request comes from. Never a guard of data: that is the data layer. */
export function proxy(request: NextRequest): NextResponse {
  if (request.method !== "GET" && request.method !== "HEAD") {
    const origin = request.headers.get("origin");
    const own = origin ? new URL(origin === "null" ? "null://" : origin).host === request.headers.get("host") : request.headers.get("sec-fetch-site") === "same-origin";
    if (!own) return new NextResponse("This came from another site.", { status: 403 });
  }
  const nonce = btoa(crypto.randomUUID());
  const dev = process.env.NODE_ENV === "development";
  const csp = [
    "default-src 'self'",
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${dev ? " 'unsafe-eval'" : ""}`,
    "style-src 'self' 'unsafe-inline'",
    "img-src 'self' blob: data:", "font-src 'self'", "connect-src 'self'", "worker-src 'self'", "manifest-src 'self'",
    "object-src 'none'", "base-uri 'none'", "form-action 'self'", "frame-ancestors 'none'",
  ].join("; ");
  const headers = new Headers(request.headers);
  headers.set("x-nonce", nonce);
  headers.set("content-security-policy", csp);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set("content-security-policy", csp);
  response.headers.set("x-content-type-options", "nosniff");
  response.headers.set("x-frame-options", "DENY");
  response.headers.set("cross-origin-opener-policy", "same-origin");
  response.headers.set("permissions-policy", "camera=(self), microphone=(), geolocation=()");
  // Never "no-referrer": it would blank the Origin of a plain form, and the customer's page must work without scripts.
  response.headers.set("referrer-policy", "same-origin");
  response.headers.set("strict-transport-security", "max-age=31536000; includeSubDomains");
  response.headers.set("cache-control", "private, no-store");
  return response;
}

export const config = {
  matcher: [{ source: "/((?!api|_next/static|_next/image|favicon.ico|sw.js|manifest.webmanifest|icon).*)" }],
};
