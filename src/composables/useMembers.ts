import { useMutation, useQuery, useQueryClient } from '@tanstack/vue-query'
import type { TransferRequest } from '#shared/contract/account.ts'
import type { BuildRole } from '#shared/contract/build.ts'
import * as api from '../api/members.ts'
import { buildsKey } from './useBuilds.ts'

/** The people of one build and what can be done with them. */
export function useMembers(buildId: string) {
  const client = useQueryClient()
  const queryKey = ['members', buildId] as const
  const query = useQuery({ queryKey, queryFn: ({ signal }) => api.listMembers(buildId, signal) })
  const onSuccess = () =>
    Promise.all([client.invalidateQueries({ queryKey }), client.invalidateQueries({ queryKey: buildsKey })])

  return {
    ...query,
    invite: useMutation({
      mutationFn: (wanted: { email: string; role: Exclude<BuildRole, 'owner'> }) =>
        api.invite(buildId, wanted.email, wanted.role),
      onSuccess,
    }),
    withdraw: useMutation({
      mutationFn: (invitationId: string) => api.withdrawInvitation(buildId, invitationId),
      onSuccess,
    }),
    change: useMutation({
      mutationFn: (wanted: { userId: string; role: BuildRole }) =>
        api.changeMember(buildId, wanted.userId, wanted.role),
      onSuccess,
    }),
    transfer: useMutation({
      mutationFn: (wanted: TransferRequest) => api.transferOwnership(buildId, wanted),
      onSuccess,
    }),
    remove: useMutation({ mutationFn: (userId: string) => api.removeMember(buildId, userId), onSuccess }),
  }
}
