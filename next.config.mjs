/** On every answer; the Content-Security-Policy, whose nonce is new each time, is proxy.ts's. */
const SECURITY_HEADERS = [
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'Referrer-Policy', value: 'same-origin' },
  { key: 'Permissions-Policy', value: 'camera=(), microphone=(), geolocation=()' },
]

/** Pages that whoever holds their link opens: not for search engines, and their address goes nowhere else. */
const SECRET_LINK_HEADERS = [
  { key: 'Referrer-Policy', value: 'no-referrer' },
  { key: 'X-Robots-Tag', value: 'noindex, nofollow, noarchive' },
  { key: 'Cache-Control', value: 'private, no-store' },
]

/** @type {import('next').NextConfig} */
const nextConfig = {
  poweredByHeader: false,
  // The later entry wins where two set the same header.
  headers: async () => [
    { source: '/:path*', headers: SECURITY_HEADERS },
    { source: '/share/:path*', headers: SECRET_LINK_HEADERS },
    { source: '/api/share/:path*', headers: SECRET_LINK_HEADERS },
    { source: '/invite/:path*', headers: SECRET_LINK_HEADERS },
    { source: '/(verify-email|reset-password)', headers: SECRET_LINK_HEADERS },
  ],
  reactStrictMode: true,
  serverExternalPackages: ['@node-rs/argon2', 'pg'],
  // One checkout is one project: without this Next.js looks for lock files in the folders above it.
  turbopack: { root: import.meta.dirname },
}

export default nextConfig
