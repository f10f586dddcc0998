import { fileURLToPath } from 'node:url';

/** @type {import('next').NextConfig} */
const config = {
  distDir: '.next-empty',
  poweredByHeader: false,
  turbopack: { root: fileURLToPath(new URL('../../..', import.meta.url)) },
};

export default config;
