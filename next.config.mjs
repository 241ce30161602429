/** @type {import('next').NextConfig} */
const config = {
  poweredByHeader: false,
  reactStrictMode: true,
  serverExternalPackages: [
    'knex',
    'pg',
    'pino',
    'sharp',
    '@node-rs/argon2',
    'graphile-worker',
    'formidable',
    'nodemailer',
  ],
  outputFileTracingRoot: import.meta.dirname,
  turbopack: { root: import.meta.dirname },
  devIndicators: false,
};
export default config;
