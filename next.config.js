/**
 * Next.js settings. Headers that are the same for every answer live here; the content security policy carries a fresh
 * nonce for each request, so it lives in proxy.ts.
 */

/** Largest form: a series of the longest span with a reason for each month (lib/services/forms.ts). Files are read in the browser. */
const LARGEST_FORM = '500kb';

const headersForAll = [
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'X-Frame-Options', value: 'DENY' },
  { key: 'Cross-Origin-Opener-Policy', value: 'same-origin' },
  { key: 'Permissions-Policy', value: 'camera=(), microphone=(), geolocation=(), payment=()' },
];

/** A forecast link or a set-up link is a secret in the address: keep it out of caches, referrers and search engines. */
const headersForSecretAddresses = [
  { key: 'X-Robots-Tag', value: 'noindex, nofollow, noarchive' },
  { key: 'Referrer-Policy', value: 'no-referrer' },
  { key: 'Cache-Control', value: 'private, no-store' },
];

/** @type {import('next').NextConfig} */
const config = {
  // A second build beside a running one, for example in the browser tests.
  distDir: process.env.NEXT_DIST_DIR || '.next',
  // Types are checked once for the whole tree by the tests, not again by each first start.
  typescript: { ignoreBuildErrors: true },
  poweredByHeader: false,
  agentRules: false,
  devIndicators: false,
  experimental: { serverActions: { bodySizeLimit: LARGEST_FORM } },
  headers: async () => [
    { source: '/:path*', headers: [...headersForAll, { key: 'Referrer-Policy', value: 'same-origin' }] },
    { source: '/f/:path*', headers: headersForSecretAddresses },
    { source: '/set-up/:path*', headers: headersForSecretAddresses },
  ],
};

export default config;
