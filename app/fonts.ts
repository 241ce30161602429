import localFont from 'next/font/local';

/** For text: drawn to keep look-alike figures apart. */
export const textFont = localFont({
  src: [{ path: './fonts/atkinson-hyperlegible-next-latin-wght-normal.woff2', weight: '200 800' }],
  variable: '--font-text',
  display: 'swap',
});

/** For every measured number. */
export const sizeFont = localFont({
  src: [{ path: './fonts/atkinson-hyperlegible-mono-latin-wght-normal.woff2', weight: '200 800' }],
  variable: '--font-size',
  display: 'swap',
});

/** For the wordmark and order numbers only. */
export const numberFont = localFont({
  src: [{ path: './fonts/big-shoulders-stencil-latin-wght-normal.woff2', weight: '100 900' }],
  variable: '--font-number',
  display: 'swap',
});
