/** @type {import('next').NextConfig} */
const config = {
  poweredByHeader: false,
  // `npm run dev` is reached by this address; without it the page would not wake up.
  allowedDevOrigins: ['127.0.0.1'],
  // `npm run check` type-checks everything, tests included; a build need not do it a second time.
  typescript: { ignoreBuildErrors: true },
  // Native code and a pool of connections: loaded by Node, not bundled.
  serverExternalPackages: ['@node-rs/argon2', 'pg', 'pino'],
  headers: async () => [
    {
      source: '/:path*',
      headers: [
        { key: 'X-Content-Type-Options', value: 'nosniff' },
        { key: 'X-Frame-Options', value: 'DENY' },
        { key: 'Referrer-Policy', value: 'same-origin' },
      ],
    },
  ],
}

export default config
