import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { readBuild } from '#shared/build/read.ts'
import { resolve } from '#shared/build/resolve.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import { driveMap } from '#shared/inventory/driveMap.ts'
import { drivePages } from '#shared/paper/drives/drivePages.ts'
import { pageSvg } from '#shared/paper/pageSvg.ts'
import { loadCatalogFiles } from '../../../../server/services/catalogFiles.ts'

const catalog = indexCatalog(loadCatalogFiles())
const read = readBuild(JSON.parse(readFileSync('examples/projection-24/build.json', 'utf8')), catalog)
if (!read.ok) throw new Error('the example cannot be read')
const map = driveMap(resolve(read.document, catalog), check(read.document, catalog))

test.each(['a4', 'letter'] as const)('every serial of the drive map stands on a page on its side (%s)', (paper) => {
  const { pages } = drivePages(map, 'Drives, projection, revision 3', paper)
  expect(pages.every(({ width_mm, height_mm }) => width_mm > height_mm)).toBe(true)
  const text = pages.map(pageSvg).join('\n')
  expect(map).toHaveLength(25)
  for (const { serial } of map) expect(text).toContain(serial)
})
