import { useMutation, useQuery, useQueryClient } from '@tanstack/vue-query'
import { endOtherSessions, endOwnSession, listOwnSessions } from '../api/ownAccount.ts'

/** The browsers in which one is signed in, and how to end that. */
export function useOwnSessions() {
  const client = useQueryClient()
  const queryKey = ['own-sessions'] as const
  const query = useQuery({ queryKey, queryFn: ({ signal }) => listOwnSessions(signal) })
  const onSuccess = () => client.invalidateQueries({ queryKey })
  return {
    ...query,
    end: useMutation({ mutationFn: endOwnSession, onSuccess }),
    endOthers: useMutation({ mutationFn: endOtherSessions, onSuccess }),
  }
}
