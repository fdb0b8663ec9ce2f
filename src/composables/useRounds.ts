import { useMutation, useQuery, useQueryClient } from '@tanstack/vue-query'
import { computed, watch } from 'vue'
import type { ReviewState } from '#shared/contract/reviewState.ts'
import type { AskRoundRequest, GiveVerdictRequest, ReviewRules } from '#shared/contract/rounds.ts'
import { reviewStateOf } from '#shared/review/state.ts'
import * as api from '../api/rounds.ts'
import { linksKey } from './useBuildLinks.ts'
import { buildsKey } from './useBuilds.ts'

export const roundsKey = (buildId: string) => ['rounds', buildId] as const

/** The rounds of one build and what can be done with them. */
export function useRounds(buildId: string) {
  const client = useQueryClient()
  const queryKey = roundsKey(buildId)
  const query = useQuery({ queryKey, queryFn: ({ signal }) => api.listRounds(buildId, signal) })
  const onSuccess = () =>
    Promise.all([
      client.invalidateQueries({ queryKey }),
      client.invalidateQueries({ queryKey: linksKey(buildId) }),
      client.invalidateQueries({ queryKey: buildsKey }),
    ])
  const rounds = computed(() => query.data.value?.rounds ?? [])

  return {
    ...query,
    rounds,
    open: computed(() => rounds.value.find(({ state }) => state === 'open') ?? null),
    earlier: computed(() => rounds.value.filter(({ state }) => state !== 'open')),
    rules: computed(() => query.data.value?.rules ?? null),
    ask: useMutation({ mutationFn: (wanted: AskRoundRequest) => api.askRound(buildId, wanted), onSuccess }),
    judge: useMutation({
      mutationFn: ({ roundId, ...verdict }: GiveVerdictRequest & { roundId: string }) =>
        api.giveVerdict(buildId, roundId, verdict),
      onSuccess,
    }),
    end: useMutation({
      mutationFn: ({ roundId, as }: { roundId: string; as: 'closed' | 'withdrawn' }) =>
        api.endRound(buildId, roundId, as),
      onSuccess,
    }),
    setRules: useMutation({ mutationFn: (rules: ReviewRules) => api.setRules(buildId, rules), onSuccess }),
  }
}

/**
 * How a build stands with its reviewers; null until that is known. `revision`: the newest one, after which it is asked again,
 * for a save may have ended an approval.
 */
export function useReviewState(buildId: string, revision: () => number | null) {
  const client = useQueryClient()
  const queryKey = roundsKey(buildId)
  const query = useQuery({ queryKey, queryFn: ({ signal }) => api.listRounds(buildId, signal) })
  watch(revision, (now, before) => {
    if (before !== null && now !== before) void client.invalidateQueries({ queryKey })
  })
  return computed<ReviewState | null>(() => (query.data.value ? reviewStateOf(query.data.value.rounds) : null))
}
