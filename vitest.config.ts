import { fileURLToPath } from 'node:url'
import { defineVitestProject } from '@nuxt/test-utils/config'
import { defineConfig } from 'vitest/config'

const root = fileURLToPath(new URL('.', import.meta.url))
const alias = { '#shared': `${root}shared` }

/** Loading Nuxt takes seconds: not for those who asked for other projects only. */
function wantsNuxt() {
  const asked = process.argv.flatMap((word, index, all) => word === '--project' ? [all[index + 1]] : word.startsWith('--project=') ? [word.slice(10)] : [])
  return asked.length === 0 || asked.includes('nuxt')
}

export default defineConfig({
  test: {
    projects: [
      {
        resolve: { alias },
        test: { name: 'unit', environment: 'node', include: ['tests/unit/**/*.test.ts'] },
      },
      {
        resolve: { alias },
        test: {
          name: 'integration',
          environment: 'node',
          include: ['tests/integration/**/*.test.ts'],
          globalSetup: ['tests/support/global-database.ts'],
          testTimeout: 20_000,
          hookTimeout: 60_000,
          sequence: { groupOrder: 1 },
        },
      },
      ...wantsNuxt()
        ? [await defineVitestProject({
            test: {
              name: 'nuxt',
              environment: 'nuxt',
              include: ['tests/nuxt/**/*.test.ts'],
              environmentOptions: { nuxt: { domEnvironment: 'happy-dom' } },
              testTimeout: 20_000,
              hookTimeout: 60_000,
              sequence: { groupOrder: 2 },
            },
          })]
        : [],
      {
        resolve: { alias },
        test: {
          name: 'e2e',
          environment: 'node',
          include: ['tests/e2e/**/*.test.ts'],
          globalSetup: ['tests/support/global-database.ts', 'tests/support/global-build.ts'],
          testTimeout: 90_000,
          hookTimeout: 120_000,
          // One browser and one server at a time: on two cores a second pair would only make both slow.
          maxWorkers: 1,
          fileParallelism: false,
          sequence: { groupOrder: 3 },
        },
      },
    ],
  },
})
