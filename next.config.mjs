import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = path.dirname(fileURLToPath(import.meta.url));

/** @type {import('next').NextConfig} */
const config = {
  distDir: process.env.LAMMAS_DIST ?? '.next',
  poweredByHeader: false,
  reactStrictMode: true,
  serverExternalPackages: ['sequelize', 'sqlite3', 'umzug'],
  turbopack: { root },
  outputFileTracingRoot: root,
  // The field app is one static page; every address below /field is the same shell (offline too).
  async rewrites() {
    return { beforeFiles: [{ source: '/field/:path+', destination: '/field' }], afterFiles: [], fallback: [] };
  },
};

export default config;
