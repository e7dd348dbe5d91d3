/** @type {import('next').NextConfig} */
const config = {
  // Tests and a running installation build side by side, so the folder is a setting.
  distDir: process.env.NEXT_DIST_DIR || '.next',
  poweredByHeader: false,
  productionBrowserSourceMaps: false,
  // Live streams must not be held back by compression; a proxy before us compresses the rest.
  compress: false,
  serverExternalPackages: ['pg', 'kysely', 'graphile-worker', 'pdfkit', 'nodemailer', 'pino', '@node-rs/argon2', 'mathjs'],
  allowedDevOrigins: ['127.0.0.1', 'localhost'],
  devIndicators: false,
};
export default config;
