/** @type {import('next').NextConfig} */
const nextConfig = {
  poweredByHeader: false,
  reactStrictMode: true,
  serverExternalPackages: ['@node-rs/argon2', 'pg'],
  // One checkout is one project: without this Next.js looks for lock files in the folders above it.
  turbopack: { root: import.meta.dirname },
}

export default nextConfig
