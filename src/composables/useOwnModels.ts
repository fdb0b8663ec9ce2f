import { useMutation, useQuery, useQueryClient } from '@tanstack/vue-query'
import { computed } from 'vue'
import type { OwnModel } from '#shared/contract/catalog.ts'
import { deleteModelPhoto, deleteOwnModel, listOwnModels, putModelPhoto, putOwnModel } from '../api/ownModels.ts'
import { useSessionStore } from '../stores/session.ts'

export const ownModelsKey = ['own-models'] as const

/** The models in the signed-in person's own library. Empty for visitors. */
export function useOwnModels() {
  const client = useQueryClient()
  const session = useSessionStore()
  const query = useQuery({
    queryKey: ownModelsKey,
    queryFn: ({ signal }) => listOwnModels(signal),
    enabled: computed(() => session.user !== null),
  })
  const models = computed<OwnModel[]>(() => query.data.value ?? [])
  const refresh = () => client.invalidateQueries({ queryKey: ownModelsKey })
  const save = useMutation({ mutationFn: putOwnModel, onSuccess: refresh })
  const remove = useMutation({ mutationFn: deleteOwnModel, onSuccess: refresh })
  const keepPhoto = useMutation({ mutationFn: putModelPhoto, onSuccess: refresh })
  const dropPhoto = useMutation({ mutationFn: deleteModelPhoto, onSuccess: refresh })
  return { ...query, models, save, remove, keepPhoto, dropPhoto }
}
