import type { Ref } from 'vue'
import type { Category, Measurements } from '#shared/domain/measuring/index'
import { currentDefinition, writeMeasurements } from '#shared/domain/measuring/index'
import type { ClassStanding, ScoreAnswer } from '#shared/schemas/scores'

export interface Standing extends ClassStanding {
  /** Of the measurements rounded down, not as read. */
  readonly rounded: boolean
}

/** Changes follow each other quickly at a bench; the lists are asked when the hand rests. */
const REST_MS = 500

/**
 * Minimum, margin and rank of every class that a sheet could enter, as read and rounded down. The score itself needs no
 * server; only the lists do, so a failure here leaves everything else standing.
 */
export function useStandings(category: Category, asRead: Ref<Measurements>, rounded: Ref<Measurements>) {
  const definition = currentDefinition(category)
  const standings = ref<readonly Standing[] | null>(null)
  const state = ref<'idle' | 'asking' | 'failed'>('idle')
  let timer: ReturnType<typeof setTimeout> | undefined
  let latest = 0

  const fetchClasses = async (measurements: Measurements, isRounded: boolean): Promise<Standing[]> => {
    const { classes } = await $fetch<ScoreAnswer>('/api/scores', { method: 'POST', body: { category, measurements: writeMeasurements(definition, measurements) } })
    return classes.map(row => ({ ...row, rounded: isRounded }))
  }

  async function ask() {
    const mine = ++latest
    state.value = 'asking'
    try {
      const both = await Promise.all([fetchClasses(asRead.value, false), fetchClasses(rounded.value, true)])
      // An answer that was overtaken by a later question says nothing any more.
      if (mine !== latest) return
      standings.value = both.flat().sort((a, b) => Number(a.category !== category) - Number(b.category !== category) || Number(a.rounded) - Number(b.rounded))
      state.value = 'idle'
    }
    catch {
      if (mine === latest) state.value = 'failed'
    }
  }

  if (import.meta.client) {
    watch([() => JSON.stringify(asRead.value), () => JSON.stringify(rounded.value)], ([read]) => {
      clearTimeout(timer)
      if (read !== EMPTY) timer = setTimeout(ask, REST_MS)
      else standings.value = null
    })
    onScopeDispose(() => clearTimeout(timer))
  }
  return { standings, state, ask }
}

const EMPTY = JSON.stringify({ single: {}, right: {}, left: {}, lists: {} })
