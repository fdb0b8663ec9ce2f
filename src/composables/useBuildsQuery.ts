import { computed } from 'vue'
import { useRoute, useRouter } from 'vue-router'
import { listBuildsQuerySchema } from '#shared/contract/build.ts'

export const buildsPageSize = 25

/** What the list shows, kept in the address: it can be linked, and back goes back. Nonsense in it counts as not given. */
export function useBuildsQuery() {
  const route = useRoute()
  const router = useRouter()
  const shape = listBuildsQuerySchema.shape
  const one = (value: unknown): unknown => (Array.isArray(value) ? value[0] : (value ?? undefined))

  const query = computed(() => ({
    search: shape.search.safeParse(one(route.query['search'])).data ?? '',
    sort: shape.sort.safeParse(one(route.query['sort'])).data ?? 'changed',
    archived: shape.archived.safeParse(one(route.query['archived'])).data ?? 'no',
    page: shape.page.safeParse(one(route.query['page'])).data ?? 1,
    pageSize: buildsPageSize,
  }))

  /** Changes part of it; anything but turning the page starts from the first page again. */
  function show(change: Partial<Omit<typeof query.value, 'pageSize'>>): void {
    const next = { ...query.value, page: 1, ...change }
    void router.replace({
      query: {
        search: next.search || undefined,
        sort: next.sort === 'changed' ? undefined : next.sort,
        archived: next.archived === 'no' ? undefined : next.archived,
        page: next.page === 1 ? undefined : String(next.page),
      },
    })
  }

  return { query, show }
}
