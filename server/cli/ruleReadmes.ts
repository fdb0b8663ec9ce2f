import { writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { rules } from '#shared/rules/index.ts'
import { ruleReadme } from '#shared/rules/readme.ts'
import { loadCatalogFiles } from '../services/catalogFiles.ts'

/** Writes the page of every rule from its own metadata: `npx tsx server/cli/ruleReadmes.ts`. */
const { sources } = indexCatalog(loadCatalogFiles())
for (const { meta } of rules)
  writeFileSync(
    fileURLToPath(new URL(`../../shared/rules/${meta.id}/README.md`, import.meta.url)),
    ruleReadme(meta, sources),
  )
