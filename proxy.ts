import { NextResponse, type NextRequest } from "next/server";

const development = process.env.NODE_ENV === "development";

/**
 * Puts a content security policy with a nonce of its own on each page, and turns away writes that another site
 * started. It is no guard of anything: who may read or write is decided where the data are.
 */
export function proxy(request: NextRequest): NextResponse {
  if (isForeignWrite(request))
    return new NextResponse("This request came from another site and was not carried out.", { status: 403 });
  const nonce = btoa(String.fromCharCode(...crypto.getRandomValues(new Uint8Array(16))));
  const secure = process.env.APP_URL?.startsWith("https:") ?? false;
  const policy = contentPolicy(nonce, secure);
  const headers = new Headers(request.headers);
  // Next reads the nonce from the policy on the request and puts it on its own scripts.
  headers.set("content-security-policy", policy);
  headers.set("x-nonce", nonce);
  // Where somebody signed out wanted to go: a page cannot see its own address.
  headers.set("x-surdmark-path", request.nextUrl.pathname + request.nextUrl.search);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set("content-security-policy", policy);
  if (secure) response.headers.set("strict-transport-security", "max-age=63072000; includeSubDomains");
  return response;
}

/** Route handlers and files are left out: bodies over 10 MiB would be cut, and they have headers of their own. */
export const config = {
  matcher: ["/((?!api/|_next/static|_next/image|favicon.ico|mark.svg|fonts/).*)"],
};

function contentPolicy(nonce: string, secure: boolean): string {
  return [
    "default-src 'self'",
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${development ? " 'unsafe-eval'" : ""}`,
    `style-src 'self' ${development ? "'unsafe-inline'" : `'nonce-${nonce}'`}`,
    // Typeset mathematics places its parts by style attributes; no style element gets in by this.
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "font-src 'self'",
    "connect-src 'self'",
    "object-src 'none'",
    "base-uri 'none'",
    "form-action 'self'",
    "frame-ancestors 'none'",
    ...(secure ? ["upgrade-insecure-requests"] : []),
  ].join("; ");
}

/** A write whose sender is another site, or whose sender cannot be told. Next itself accepts an action without Origin. */
function isForeignWrite(request: NextRequest): boolean {
  if (request.method === "GET" || request.method === "HEAD" || request.method === "OPTIONS") return false;
  const site = request.headers.get("sec-fetch-site");
  if (site !== null) return site !== "same-origin";
  // Browsers leave Sec-Fetch-Site out on plain http to other machines; Origin is there on every write.
  const origin = request.headers.get("origin");
  return origin === null || !URL.canParse(origin) || new URL(origin).host !== request.headers.get("host");
}
