import { useQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import { buildDocumentSchema, type BuildDocument } from '#shared/build/document.ts'
import { check } from '#shared/check/check.ts'
import type { CheckResult } from '#shared/check/result.ts'
import type { Revision } from '#shared/contract/revisions.ts'
import { readRevision } from '../api/revisions.ts'
import { useCatalog } from './useCatalog.ts'

/** One revision of a build, read and judged. */
export interface CheckedRevision {
  revision: Revision
  document: BuildDocument
  result: CheckResult
}

/** Fetches a revision, which never changes, and judges it with the catalog as it is today. Null asks for nothing. */
export function useRevisionCheck(buildId: string, revision: MaybeRefOrGetter<number | null>) {
  const { index, error: catalogError } = useCatalog()
  const query = useQuery({
    queryKey: computed(() => ['revision', buildId, toValue(revision)]),
    queryFn: async () => {
      const read = await readRevision(buildId, toValue(revision) ?? 0)
      return { revision: read.revision, document: buildDocumentSchema.parse(read.document) }
    },
    enabled: () => toValue(revision) !== null,
    staleTime: Infinity,
  })
  const checked = computed<CheckedRevision | null>(() => {
    const [read, catalog] = [query.data.value, index.value]
    return read && catalog ? { ...read, result: check(read.document, catalog) } : null
  })
  return { checked, index, error: computed(() => query.error.value ?? catalogError.value) }
}
