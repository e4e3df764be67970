import type { SheetDefinition } from '#shared/domain/measuring/index'
import { readMeasurements, writeMeasurements } from '#shared/domain/measuring/index'
import type { FileSheet } from '#shared/schemas/file'

/** What the measurer says beside the readings. */
export interface BenchFacts {
  measuredOn: string
  driedSince: string
  driedFrom: string
  wholeSkull: boolean | null
  reasons: Record<string, string>
}

export type SaveState = 'saved' | 'unsaved' | 'saving' | 'offline' | 'conflict' | 'refused'

interface KeptSheet { readonly version: number, readonly draft: SheetDraft, readonly facts: BenchFacts }

const PAUSE_MS = 900

/**
 * The open sheet of an entry while it is written: kept in the browser at once and on the server a moment later. When somebody
 * else saved it meanwhile, neither is lost: the measurer chooses.
 *
 * @param saved called after each save, with the server's new version
 */
export function useBenchSheet(entryId: string, definition: SheetDefinition, open: FileSheet, today: string, saved: () => Promise<void>) {
  const keptAt = `hartroll.bench.${open.id}`
  const draft = ref<SheetDraft>(draftOf(definition, readMeasurements(definition, open.measurements).measurements))
  const facts = ref<BenchFacts>({
    measuredOn: open.measuredOn ?? today, driedSince: open.driedSince ?? '', driedFrom: open.driedFrom ?? 'taken', wholeSkull: open.wholeSkull, reasons: { ...open.reasons },
  })
  const version = ref(open.version)
  /** The entry's version after the last saving from here, for an act that follows at once. */
  const entryVersion = ref(0)
  const state = ref<SaveState>('saved')
  const errors = ref<Record<string, string>>({})
  const refusal = ref<string | null>(null)
  const restored = ref(false)
  let timer: ReturnType<typeof setTimeout> | undefined
  let running: Promise<boolean> | null = null
  let watching = false

  const body = () => ({
    measurements: writeMeasurements(definition, readMeasurements(definition, writtenDraft(draft.value)).measurements),
    measuredOn: facts.value.measuredOn || null, driedSince: facts.value.driedSince || null, driedFrom: facts.value.driedFrom || null,
    wholeSkull: facts.value.wholeSkull,
    reasons: Object.fromEntries(Object.entries(facts.value.reasons).filter(([, reason]) => reason.trim() !== '')),
  })
  const keep = () => localStorage.setItem(keptAt, JSON.stringify({ version: version.value, draft: draft.value, facts: facts.value } satisfies KeptSheet))

  /** Saves what is not saved yet, after a saving that is under way. @returns whether all of it is on the server */
  async function save(): Promise<boolean> {
    clearTimeout(timer)
    if (running) await running
    if (state.value === 'saved') return true
    if (state.value === 'conflict') return false
    running = send()
    const sent = await running
    running = null
    return sent
  }
  async function send(): Promise<boolean> {
    state.value = 'saving'
    const sent = JSON.stringify(body())
    try {
      const answer = await api<{ version: number, entryVersion: number }>(`/api/entries/${entryId}/sheet`, { method: 'PUT', body: JSON.parse(sent), ifMatch: version.value })
      version.value = answer.version
      entryVersion.value = answer.entryVersion
      errors.value = {}
      refusal.value = null
      if (JSON.stringify(body()) === sent) {
        state.value = 'saved'
        localStorage.removeItem(keptAt)
      }
      else {
        state.value = 'unsaved'
        timer = setTimeout(save, PAUSE_MS)
      }
      await saved()
      return true
    }
    catch (error) {
      if (!(error instanceof ApiError)) throw error
      const { problem } = error
      refusal.value = problem.detail
      errors.value = Object.fromEntries(problem.errors.map(field => [field.path, field.message]))
      state.value = problem.status === 412 ? 'conflict' : problem.status === 0 || problem.status >= 500 ? 'offline' : 'refused'
      if (state.value === 'offline') timer = setTimeout(save, 8_000)
      return false
    }
  }
  function change() {
    if (!watching) return
    keep()
    if (state.value === 'conflict' || state.value === 'saving') return
    state.value = 'unsaved'
    clearTimeout(timer)
    timer = setTimeout(save, PAUSE_MS)
  }
  /** Mine over theirs, knowing that theirs is there. */
  async function keepMine(newVersion: number) {
    version.value = newVersion
    state.value = 'unsaved'
    return save()
  }
  function takeTheirs(theirs: FileSheet) {
    watching = false
    draft.value = draftOf(definition, readMeasurements(definition, theirs.measurements).measurements)
    facts.value = { measuredOn: theirs.measuredOn ?? today, driedSince: theirs.driedSince ?? '', driedFrom: theirs.driedFrom ?? 'taken', wholeSkull: theirs.wholeSkull, reasons: { ...theirs.reasons } }
    version.value = theirs.version
    localStorage.removeItem(keptAt)
    state.value = 'saved'
    nextTick(() => { watching = true })
  }

  watch([draft, facts], change, { deep: true })
  onMounted(() => {
    const kept = localStorage.getItem(keptAt)
    if (kept) {
      const { version: of, draft: readings, facts: said } = JSON.parse(kept) as KeptSheet
      draft.value = readings
      facts.value = said
      restored.value = true
      watching = true
      state.value = of === version.value ? 'unsaved' : 'conflict'
      if (state.value === 'unsaved') timer = setTimeout(save, PAUSE_MS)
    }
    nextTick(() => { watching = true })
    window.addEventListener('beforeunload', warn)
  })
  function warn(event: BeforeUnloadEvent) {
    if (state.value !== 'saved') event.preventDefault()
  }
  onBeforeUnmount(() => {
    window.removeEventListener('beforeunload', warn)
    if (state.value === 'unsaved') void save()
    clearTimeout(timer)
  })
  return { draft, facts, version, entryVersion, state, errors, refusal, restored, save, keepMine, takeTheirs }
}
