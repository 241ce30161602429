/** On every answer, whatever it is. */
const headers = [
  { key: 'x-content-type-options', value: 'nosniff' },
  { key: 'referrer-policy', value: 'same-origin' },
  { key: 'x-frame-options', value: 'DENY' },
  { key: 'cross-origin-opener-policy', value: 'same-origin' },
  { key: 'permissions-policy', value: 'camera=(self), geolocation=(), microphone=()' },
  { key: 'strict-transport-security', value: 'max-age=31536000' },
];

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
  turbopack: { root: import.meta.dirname },
  devIndicators: false,
  headers: () => Promise.resolve([{ source: '/:path*', headers }]),
};
export default config;
