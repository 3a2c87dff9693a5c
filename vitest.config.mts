import { fileURLToPath } from 'node:url'
import react from '@vitejs/plugin-react'
import { defineConfig } from 'vitest/config'

const root = fileURLToPath(new URL('.', import.meta.url))
const alias = [
  { find: /^server-only$/, replacement: `${root}tests/helpers/server-only.ts` },
  { find: /^@\//, replacement: root },
]

export default defineConfig({
  plugins: [react()],
  resolve: { alias },
  test: {
    restoreMocks: true,
    unstubEnvs: true,
    // Verbs read the address for links from the environment; nothing outside the tests uses these values.
    env: { DAYBREATH_SECRET: 'a secret for tests only, never for real use', DAYBREATH_LOG_LEVEL: 'silent' },
    projects: [
      {
        extends: true,
        test: {
          name: 'node',
          environment: 'node',
          include: ['tests/**/*.test.{ts,tsx}'],
          exclude: ['tests/components/**', 'tests/e2e/**', 'node_modules/**'],
          testTimeout: 20_000,
          hookTimeout: 30_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'jsdom',
          environment: 'jsdom',
          include: ['tests/components/**/*.test.{ts,tsx}'],
          setupFiles: ['tests/helpers/jsdom-setup.ts'],
          testTimeout: 20_000,
          hookTimeout: 30_000,
        },
      },
    ],
  },
})
