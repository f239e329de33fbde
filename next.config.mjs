/** On every answer; the Content-Security-Policy, whose nonce is new each time, is proxy.ts's. */
const SECURITY_HEADERS = [
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'Referrer-Policy', value: 'same-origin' },
  { key: 'Permissions-Policy', value: 'camera=(), microphone=(), geolocation=()' },
]

/** @type {import('next').NextConfig} */
const nextConfig = {
  poweredByHeader: false,
  headers: async () => [{ source: '/:path*', headers: SECURITY_HEADERS }],
  reactStrictMode: true,
  serverExternalPackages: ['@node-rs/argon2', 'pg'],
  // One checkout is one project: without this Next.js looks for lock files in the folders above it.
  turbopack: { root: import.meta.dirname },
}

export default nextConfig
