import { useQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import { buildDocumentSchema } from '#shared/build/document.ts'
import { readRevision } from '../api/revisions.ts'

/** One revision with its document. It never changes: what was fetched once is kept. */
export const useRevision = (buildId: MaybeRefOrGetter<string>, revision: MaybeRefOrGetter<number>) =>
  useQuery({
    queryKey: computed(() => ['revision', toValue(buildId), toValue(revision)]),
    queryFn: async ({ signal }) => {
      const read = await readRevision(toValue(buildId), toValue(revision), signal)
      return { revision: read.revision, document: buildDocumentSchema.parse(read.document) }
    },
    staleTime: Infinity,
  })
