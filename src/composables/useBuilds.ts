import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/vue-query'
import { toValue, type MaybeRefOrGetter } from 'vue'
import {
  archiveBuild,
  createBuild,
  duplicateBuild,
  importBuild,
  listBuilds,
  restoreBuild,
  type BuildsQuery,
} from '../api/builds.ts'

export const buildsKey = ['builds'] as const

/** The person's builds, page by page; the page before stays while the next one comes. */
export const useBuildList = (query: MaybeRefOrGetter<BuildsQuery>) =>
  useQuery({
    queryKey: [...buildsKey, query],
    queryFn: ({ signal }) => listBuilds(toValue(query), signal),
    placeholderData: keepPreviousData,
  })

/** What can be done to builds from the list. Each leaves the list true. */
export function useBuildActs() {
  const client = useQueryClient()
  const onSuccess = () => client.invalidateQueries({ queryKey: buildsKey })
  return {
    create: useMutation({ mutationFn: createBuild, onSuccess }),
    bringIn: useMutation({
      mutationFn: (file: { document: unknown; name?: string }) => importBuild(file.document, file.name),
      onSuccess,
    }),
    duplicate: useMutation({ mutationFn: duplicateBuild, onSuccess }),
    archive: useMutation({ mutationFn: archiveBuild, onSuccess }),
    restore: useMutation({ mutationFn: restoreBuild, onSuccess }),
  }
}
