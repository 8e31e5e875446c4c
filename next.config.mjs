/** @type {import('next').NextConfig} */
const nextConfig = {
  reactStrictMode: true,
  poweredByHeader: false,
  compress: true,
  agentRules: false,
  // As much as a call of the API may send: one act may name every part of a large show.
  experimental: { agentUpgrade: false, serverActions: { bodySizeLimit: '16mb' } },
  // Types are checked by `npm test`; a first start need not wait for them.
  typescript: { ignoreBuildErrors: true },
  headers: async () => [{ source: '/:path*', headers: [{ key: 'X-Content-Type-Options', value: 'nosniff' }] }],
  // Native or worker-loading packages stay outside the server bundle.
  serverExternalPackages: ['@node-rs/argon2', 'pg', 'pg-boss', 'pino', 'piscina', 'nodemailer', 'flydrive'],
};

export default nextConfig;
