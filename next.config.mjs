/** @type {import('next').NextConfig} */
const nextConfig = {
  reactStrictMode: true,
  poweredByHeader: false,
  compress: true,
  agentRules: false,
  experimental: { agentUpgrade: false },
  // Native or worker-loading packages stay outside the server bundle.
  serverExternalPackages: ['@node-rs/argon2', 'pg', 'pg-boss', 'pino', 'piscina', 'nodemailer', 'flydrive'],
};

export default nextConfig;
