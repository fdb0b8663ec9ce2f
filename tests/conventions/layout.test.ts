import { describe, expect, it } from 'vitest'
import { fileExists } from '../helpers/tree.ts'

const folders = [
  'catalog/connectors',
  'catalog/models',
  'examples',
  'server/cli',
  'server/controllers',
  'server/db/migrations',
  'server/events',
  'server/jobs',
  'server/mail',
  'server/middleware',
  'server/models',
  'server/policies',
  'server/routes',
  'server/services',
  'server/setup',
  'shared/activity',
  'shared/build',
  'shared/catalog',
  'shared/check',
  'shared/contract',
  'shared/datapath',
  'shared/electrical',
  'shared/layout',
  'shared/quantity',
  'shared/rules',
  'src/api',
  'src/assets',
  'src/components',
  'src/composables',
  'src/diagram',
  'src/router',
  'src/stores',
  'src/views',
  'src/workers',
  'tests/helpers',
  'tests/journeys',
]
const files = [
  '.ci/run',
  '.env.example',
  'DEVELOPERS.md',
  'README.md',
  'catalog/sources.json',
  'index.html',
  'server/app.ts',
  'server/config.ts',
  'server/index.ts',
  'shared/check/check.ts',
  'shared/rules/index.ts',
  'src/App.vue',
  'src/main.ts',
]

describe('the layout that DEVELOPERS.md describes', () => {
  it.each(folders)('has the folder %s', (folder) => expect(fileExists(folder)).toBe(true))
  it.each(files)('has the file %s', (file) => expect(fileExists(file)).toBe(true))
})
