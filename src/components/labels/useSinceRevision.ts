import { useQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import { buildDocumentSchema } from '#shared/build/document.ts'
import { listRevisions, readRevision } from '../../api/revisions.ts'

/** Revisions that labels may be compared with, and the document of the chosen one. */
export function useSinceRevision(buildId: string, chosen: MaybeRefOrGetter<number | null>) {
  const list = useQuery({
    queryKey: ['revisions', buildId, 'for labels'],
    queryFn: ({ signal }) => listRevisions(buildId, {}, signal),
  })
  const read = useQuery({
    queryKey: computed(() => ['revision', buildId, toValue(chosen), 'document']),
    queryFn: async ({ signal }) =>
      buildDocumentSchema.parse((await readRevision(buildId, toValue(chosen) ?? 1, signal)).document),
    enabled: computed(() => toValue(chosen) !== null),
    staleTime: Infinity,
  })
  const revisions = computed(() => list.data.value ?? [])
  const document = computed(() => (toValue(chosen) === null ? null : (read.data.value ?? null)))
  return { revisions, document }
}
