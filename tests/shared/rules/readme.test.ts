import { describe, expect, it } from 'vitest'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { rules } from '#shared/rules/index.ts'
import { ruleReadme } from '#shared/rules/readme.ts'
import { loadCatalogFiles } from '../../../server/services/catalogFiles.ts'
import { readText } from '../../helpers/tree.ts'

const { sources } = indexCatalog(loadCatalogFiles())

describe('the page of a rule', () => {
  it.each(rules.map(({ meta }) => meta))(
    '$id is what its metadata makes (server/cli/ruleReadmes.ts writes it)',
    (meta) => {
      expect(readText(`shared/rules/${meta.id}/README.md`)).toBe(ruleReadme(meta, sources))
    },
  )
})
