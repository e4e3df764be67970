/** What the link is for with which a page was opened from a letter. Asked in the browser; it does not spend the link. */
export function useMailLink() {
  const route = useRoute()
  const token = computed(() => String(route.query.token ?? ''))
  const state = ref<'loading' | 'good' | 'spent' | 'failed'>('loading')
  const link = ref<{ kind: string, email: string, name: string } | null>(null)
  async function read() {
    state.value = 'loading'
    try {
      link.value = await api<{ kind: string, email: string, name: string }>('/api/account/link', { body: { token: token.value } })
      state.value = 'good'
    }
    catch (error) {
      state.value = error instanceof ApiError && error.problem.status === 422 ? 'spent' : 'failed'
    }
  }
  onMounted(read)
  return { token, state, link, read }
}
