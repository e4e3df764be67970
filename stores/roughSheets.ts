import { defineStore } from 'pinia'

/** A rough sheet as this browser keeps it. Nothing of it is on the server until an entry is begun with it. */
export interface RoughSheet {
  readonly id: string
  /** Class id, such as `mule-deer-typical`. */
  category: string
  draft: SheetDraft
  /** What was said about the head; it decides what counts and how the score is labelled. */
  condition: RoughCondition
  /** ISO 8601 in UTC. */
  readonly begunAt: string
  changedAt: string
}

export interface RoughCondition {
  splitSkull: boolean
  velvet: boolean
  /** A side taken as lost: the score is an estimate as if it matched the other. */
  estimateFrom: '' | 'right' | 'left'
  rounding: 'quarter' | 'inch'
}

const PREFIX = 'hartroll.rough.'

export const plainCondition = (): RoughCondition => ({ splitSkull: false, velvet: false, estimateFrom: '', rounding: 'quarter' })

/** A sheet as another tab or an older version wrote it, or nothing when it is none. */
function sheetFrom(text: string | null): RoughSheet | null {
  if (!text) return null
  try {
    const sheet = JSON.parse(text) as Partial<RoughSheet>
    if (typeof sheet.id !== 'string' || typeof sheet.category !== 'string' || !sheet.draft) return null
    return { begunAt: '', changedAt: '', ...sheet, draft: { ...emptyDraft(), ...sheet.draft }, condition: { ...plainCondition(), ...sheet.condition } } as RoughSheet
  }
  catch {
    return null
  }
}

/** Rough sheets kept in this browser, one key each, so that two tabs never write over each other's sheets. */
export const useRoughSheets = defineStore('roughSheets', () => {
  const sheets = ref<Record<string, RoughSheet>>({})
  /** False when the browser refused to keep something: the page says so. */
  const keeps = ref(true)
  const loaded = ref(false)

  function load() {
    if (loaded.value || import.meta.server) return
    try {
      for (const key of Object.keys(localStorage)) {
        const sheet = key.startsWith(PREFIX) ? sheetFrom(localStorage.getItem(key)) : null
        if (sheet) sheets.value[sheet.id] = sheet
      }
    }
    catch {
      keeps.value = false
    }
    loaded.value = true
    window.addEventListener('storage', (event) => {
      if (!event.key?.startsWith(PREFIX)) return
      const id = event.key.slice(PREFIX.length)
      const sheet = sheetFrom(event.newValue)
      if (sheet) sheets.value[id] = sheet
      else sheets.value = Object.fromEntries(Object.entries(sheets.value).filter(([other]) => other !== id))
    })
  }

  function keep(sheet: RoughSheet) {
    sheet.changedAt = new Date().toISOString()
    sheets.value[sheet.id] = sheet
    try {
      localStorage.setItem(PREFIX + sheet.id, JSON.stringify(sheet))
      keeps.value = true
      // Asked once something is worth keeping; a browser that says no still keeps it as long as it likes.
      void navigator.storage?.persist?.().catch(() => false)
    }
    catch {
      keeps.value = false
    }
  }

  function remove(id: string) {
    sheets.value = Object.fromEntries(Object.entries(sheets.value).filter(([other]) => other !== id))
    try {
      localStorage.removeItem(PREFIX + id)
    }
    catch {
      keeps.value = false
    }
  }

  function begin(category: string): RoughSheet {
    return { id: crypto.randomUUID?.() ?? `${Date.now()}-${Math.random().toString(36).slice(2)}`, category, draft: emptyDraft(), condition: plainCondition(), begunAt: new Date().toISOString(), changedAt: '' }
  }

  /** Newest first. */
  const newest = computed(() => Object.values(sheets.value).sort((a, b) => b.changedAt.localeCompare(a.changedAt)))
  return { sheets, newest, keeps, loaded, load, keep, remove, begin }
})
