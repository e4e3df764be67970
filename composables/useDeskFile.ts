import type { DeskFile, FileViewer } from '#shared/schemas/file'

/** A file of the desk, with what to do when somebody else changed it meanwhile. */
export async function useDeskFile(id: string, as: FileViewer) {
  // Before the first await: behind it the page's own context is gone.
  const { t } = useI18n()
  const asked = await useFetch<DeskFile>(`/api/desk/files/${id}`, { query: { as }, key: `desk-file-${as}-${id}` })
  /** Said when the file was found changed; goes with the next act. */
  const changed = ref<string | null>(null)
  const done = ref<string | null>(null)

  async function reload() {
    await asked.refresh()
    await refreshNuxtData(['bench', 'office-queue-30'])
  }
  async function stale() {
    done.value = null
    await reload()
    changed.value = t('desk.stale.text', { state: t(`states.${asked.data.value?.state ?? 'draft'}.name`) })
  }
  async function acted(transition: string) {
    changed.value = null
    await reload()
    done.value = t(`desk.events.${transition}`)
  }
  if (asked.error.value) throw createError({ statusCode: asked.error.value.statusCode ?? 500, statusMessage: asked.error.value.statusMessage, fatal: true })
  const file = asked.data as Ref<DeskFile>
  return { file, reload, stale, acted, changed, done }
}
