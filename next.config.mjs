import { existsSync, writeFileSync } from 'node:fs'

// Another output folder (DAYBREATH_DIST) lets a second server run beside the first. Next writes the folder's name into the
// compiler settings it is given, so such a run gets settings of its own and the committed ones stay as they are.
const distDir = process.env.DAYBREATH_DIST ?? '.next'
const tsconfigPath = distDir === '.next' ? 'tsconfig.json' : `tsconfig.${distDir.replace(/[^a-z0-9-]/gi, '')}.json`
if (!existsSync(tsconfigPath)) {
  const include = ['next-env.d.ts', '**/*.ts', '**/*.tsx', '**/*.mts', `${distDir}/types/**/*.ts`, `${distDir}/dev/types/**/*.ts`]
  writeFileSync(
    tsconfigPath,
    JSON.stringify({ extends: './tsconfig.json', compilerOptions: { plugins: [{ name: 'next' }] }, include }),
  )
}

// What never changes from request to request. The content policy with its nonce is in proxy.ts.
const fixedHeaders = [
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'Referrer-Policy', value: 'no-referrer' },
  { key: 'X-Frame-Options', value: 'DENY' },
  { key: 'Cross-Origin-Opener-Policy', value: 'same-origin' },
  { key: 'Cross-Origin-Resource-Policy', value: 'same-origin' },
  {
    key: 'Permissions-Policy',
    value: 'camera=(), microphone=(), geolocation=(), payment=(), usb=()',
  },
  { key: 'X-Robots-Tag', value: 'noindex, nofollow' },
]

/** @type {import('next').NextConfig} */
const config = {
  // Routes and pages that only the bench measures against end in .bench.ts(x) and are part of its own build alone.
  pageExtensions: process.env.DAYBREATH_BENCH === '1' ? ['bench.tsx', 'bench.ts', 'tsx', 'ts'] : ['tsx', 'ts'],
  distDir,
  poweredByHeader: false,
  reactStrictMode: true,
  serverExternalPackages: ['better-sqlite3', 'pino'],
  typescript: { tsconfigPath },
  headers: () =>
    Promise.resolve([
      { source: '/:path*', headers: fixedHeaders },
      {
        source: '/api/:path*',
        headers: [{ key: 'Content-Security-Policy', value: "default-src 'none'; frame-ancestors 'none'" }],
      },
    ]),
}

export default config
