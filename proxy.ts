/**
 * Runs before every page: gives each answer a content security policy with a fresh nonce. Next.js reads the nonce from
 * the request's policy and puts it on its own scripts and style sheets.
 *
 * Scripts run only with the nonce (or when loaded by a script that has it). Style attributes are allowed, because chart
 * and slider positions are set by them; style elements need the nonce.
 */
import { type NextRequest, NextResponse } from 'next/server';

const NONCE_BYTES = 16;

function createNonce(): string {
  return btoa(String.fromCharCode(...crypto.getRandomValues(new Uint8Array(NONCE_BYTES))));
}

/** The policy as one header line. In development React needs eval, and style sheets are swapped in place. */
function writePolicy(nonce: string, isDevelopment: boolean, isHttps: boolean): string {
  const rules = [
    `default-src 'self'`,
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${isDevelopment ? ` 'unsafe-eval'` : ''}`,
    isDevelopment ? `style-src 'self' 'unsafe-inline'` : `style-src 'self' 'nonce-${nonce}'`,
    `style-src-attr 'unsafe-inline'`,
    `img-src 'self' data: blob:`,
    `font-src 'self'`,
    `connect-src 'self'${isDevelopment ? ' ws:' : ''}`,
    `worker-src 'self'`,
    `object-src 'none'`,
    `base-uri 'none'`,
    `form-action 'self'`,
    `frame-ancestors 'none'`,
  ];
  if (isHttps) rules.push('upgrade-insecure-requests');
  return rules.join('; ');
}

export function proxy(request: NextRequest): NextResponse {
  const nonce = createNonce();
  const isHttps = process.env.APP_URL?.startsWith('https://') ?? false;
  const policy = writePolicy(nonce, process.env.NODE_ENV === 'development', isHttps);

  const requestHeaders = new Headers(request.headers);
  requestHeaders.set('x-nonce', nonce);
  requestHeaders.set('Content-Security-Policy', policy);

  const response = NextResponse.next({ request: { headers: requestHeaders } });
  response.headers.set('Content-Security-Policy', policy);
  if (isHttps) response.headers.set('Strict-Transport-Security', 'max-age=31536000; includeSubDomains');
  return response;
}

export const config = {
  matcher: ['/((?!_next/static|_next/image|favicon.ico|icon.svg).*)'],
};
