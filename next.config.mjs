import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = path.dirname(fileURLToPath(import.meta.url));

const securityHeaders = [
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'Referrer-Policy', value: 'same-origin' },
  { key: 'Permissions-Policy', value: 'camera=(self), geolocation=(self), microphone=(), payment=(), usb=(), display-capture=()' },
  { key: 'Cross-Origin-Opener-Policy', value: 'same-origin' },
  { key: 'Cross-Origin-Resource-Policy', value: 'same-origin' },
  { key: 'X-Frame-Options', value: 'DENY' },
];

/** @type {import('next').NextConfig} */
const config = {
  distDir: process.env.LAMMAS_DIST ?? '.next',
  poweredByHeader: false,
  reactStrictMode: true,
  serverExternalPackages: ['sequelize', 'sqlite3', 'umzug'],
  turbopack: { root },
  outputFileTracingRoot: root,
  // The content security policy is set by proxy.ts, HSTS by lib/cli/start.ts: they differ by page and by deployment.
  async headers() {
    return [
      { source: '/:path*', headers: securityHeaders },
      { source: '/sw.js', headers: [{ key: 'Cache-Control', value: 'no-cache' }] },
    ];
  },
  // The field app is one static page; every address below /field is the same shell (offline too).
  async rewrites() {
    return { beforeFiles: [{ source: '/field/:path+', destination: '/field' }], afterFiles: [], fallback: [] };
  },
};

export default config;
