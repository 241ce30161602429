import path from 'node:path';

/** The bare twin: the same framework, the same rows, and nothing of Wiretag. */
const config = {
  poweredByHeader: false,
  reactStrictMode: true,
  devIndicators: false,
  serverExternalPackages: ['pg'],
  turbopack: { root: path.resolve(import.meta.dirname, '../../..') },
};
export default config;
