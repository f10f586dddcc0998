/** @type {import('next').NextConfig} */
const config = { distDir: '.next-empty', poweredByHeader: false };

export default config;
