import { availableParallelism } from 'node:os'
import vue from '@vitejs/plugin-vue'
import { defineConfig } from 'vitest/config'

const seconds = (count: number) => count * 1000

export default defineConfig({
  plugins: [vue()],
  worker: { format: 'es' },
  build: {
    outDir: 'dist/client',
    emptyOutDir: true,
    target: 'es2022',
    // A strict Content-Security-Policy allows neither inline scripts nor data: addresses for code and fonts.
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
    chunkSizeWarningLimit: 900,
    rolldownOptions: {
      output: {
        codeSplitting: {
          groups: [
            { name: 'zod', test: /node_modules[\\/]zod[\\/]|src[\\/]zodWithoutEval/, priority: 4 },
            { name: 'vue', test: /node_modules[\\/](@vue|vue|vue-router|pinia)[\\/]/, priority: 3 },
            { name: 'canvas', test: /node_modules[\\/](@vue-flow|d3-)/, priority: 2 },
          ],
        },
      },
    },
  },
  test: {
    passWithNoTests: false,
    // Vitest leaves one core free; the tests wait for databases and browsers often enough to use them all.
    maxWorkers: availableParallelism(),
    projects: [
      {
        extends: true,
        test: {
          name: 'shared',
          include: ['tests/{shared,catalog,examples,conventions}/**/*.test.ts'],
          testTimeout: seconds(60),
          // The core keeps nothing between calls: its files can share what they load.
          isolate: false,
        },
      },
      {
        extends: true,
        test: {
          name: 'server',
          include: ['tests/server/**/*.test.ts'],
          globalSetup: ['server/setup/vitestDatabase.mjs'],
          testTimeout: seconds(60),
          hookTimeout: seconds(60),
          // Each file makes an app and a database of its own and closes both: loading the server once for all saves a minute.
          isolate: false,
        },
      },
      {
        extends: true,
        test: { name: 'pages', include: ['tests/src/**/*.test.ts'], environment: 'jsdom', testTimeout: seconds(30) },
      },
      {
        extends: true,
        test: {
          name: 'journeys',
          include: ['tests/journeys/**/*.test.ts'],
          globalSetup: ['server/setup/vitestDatabase.mjs', 'server/setup/vitestClient.mjs'],
          testTimeout: seconds(180),
          hookTimeout: seconds(120),
        },
      },
    ],
  },
})
