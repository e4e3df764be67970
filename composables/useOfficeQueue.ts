import type { OfficeQueue } from '#shared/schemas/office'

const FILTERS = ['state', 'category', 'district', 'keeper', 'q', 'sort'] as const

/** The office's queue with its filters in the address, so that a selection can be shared and come back to. */
export async function useOfficeQueue(limit: number) {
  const route = useRoute()
  const router = useRouter()
  const filters = computed(() => Object.fromEntries(FILTERS.flatMap((name) => {
    const value = route.query[name]
    return typeof value === 'string' && value !== '' ? [[name, value]] : []
  })) as Partial<Record<(typeof FILTERS)[number], string>>)
  const query = computed(() => ({ ...filters.value, ...(typeof route.query.cursor === 'string' ? { cursor: route.query.cursor } : {}), limit }))
  const asked = await useFetch<OfficeQueue>('/api/office/queue', { query, key: `office-queue-${limit}` })

  /** Changes one filter; the page mark does not belong to another selection and goes. */
  function change(name: (typeof FILTERS)[number], value: string) {
    return router.push({ path: '/desk/office', query: { ...filters.value, [name]: value || undefined } })
  }
  return { ...asked, filters, change }
}
