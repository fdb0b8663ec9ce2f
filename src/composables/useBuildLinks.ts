import { useMutation, useQuery, useQueryClient } from '@tanstack/vue-query'
import { toValue, type MaybeRefOrGetter } from 'vue'
import type { MakeLinkRequest } from '#shared/contract/buildLinks.ts'
import { clientPaths } from '#shared/contract/links.ts'
import * as api from '../api/buildLinks.ts'

export const linksKey = (buildId: string) => ['links', buildId] as const

/** The whole address of a link, as it is sent to somebody. */
export const linkAddress = (token: string): string => `${location.origin}${clientPaths.link(token)}`

/** The links into one build, for its owners. */
export function useBuildLinks(buildId: string, enabled: MaybeRefOrGetter<boolean>) {
  const client = useQueryClient()
  const queryKey = linksKey(buildId)
  const query = useQuery({
    queryKey,
    queryFn: ({ signal }) => api.listLinks(buildId, signal),
    enabled: () => toValue(enabled),
  })
  const onSuccess = () => client.invalidateQueries({ queryKey })

  return {
    ...query,
    make: useMutation({ mutationFn: (wanted: MakeLinkRequest) => api.makeLink(buildId, wanted), onSuccess }),
    revoke: useMutation({ mutationFn: (linkId: string) => api.revokeLink(buildId, linkId), onSuccess }),
    closeOut: useMutation({ mutationFn: (guestId: string) => api.closeOutGuest(buildId, guestId), onSuccess }),
  }
}
