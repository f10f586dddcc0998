/** @type {import('next').NextConfig} */
const nextConfig = {
  // Both bundlers lose pg when they bundle Sequelize's dynamic require, and pdfkit the files beside it.
  serverExternalPackages: ['sequelize', 'umzug', 'pdfkit'],
  poweredByHeader: false,
  // Names the build, so that the service worker keeps no part of another one.
  env: { NEXT_PUBLIC_BUILD: process.env.NEXT_PUBLIC_BUILD ?? Date.now().toString(36) },
  reactStrictMode: true,
  // Two checkouts, or a test run beside a running server, each build into their own folder.
  distDir: process.env.NEXT_DIST_DIR ?? '.next',
  typescript: { ignoreBuildErrors: true }, // `npm run typecheck` checks all folders, the build only some
};

export default nextConfig;
