import type { Part } from '#shared/domain/access/stakes'
import type { EntryAnswer } from './useEntry'

/** A person of the entry as the form holds it; `key` stays while it is typed, `id` comes with the first saving. */
export interface PersonDraft {
  readonly key: string
  id?: string
  part: Part
  name: string
  address: string
  email: string
  phone: string
  bornOn: string
  diedOn: string
  isMinor: boolean
  isMe: boolean
}

export interface FactsDraft extends Record<string, unknown> {
  category: string
  origin: string
  originalOrigin: string
  takenOn: string
  district: string
  districtSide: string
  method: string
  sex: string
  guided: string
  hunterPrintedAs: string
  guardianChoseName: boolean
  monthPublic: boolean
  driedSince: string
  driedFrom: string
  people: PersonDraft[]
}
export type FactName = keyof FactsDraft & string

let made = 0
export const newPerson = (part: Part): PersonDraft => ({ key: `new-${++made}`, part, name: '', address: '', email: '', phone: '', bornOn: '', diedOn: '', isMinor: false, isMe: false })

function draftOf(entry: EntryAnswer): FactsDraft {
  return {
    category: entry.category, origin: entry.origin, originalOrigin: entry.originalOrigin ?? '', takenOn: entry.takenOn === 'unknown' ? '' : entry.takenOn,
    district: entry.district ?? '', districtSide: entry.districtSide ?? '', method: entry.method ?? '', sex: entry.sex ?? '',
    guided: entry.guided === null ? '' : entry.guided ? 'yes' : 'no', hunterPrintedAs: entry.hunterPrintedAs, guardianChoseName: entry.guardianChoseName,
    monthPublic: entry.monthPublic, driedSince: entry.driedSince ?? '', driedFrom: entry.driedFrom ?? '',
    people: entry.people.map(one => ({
      key: one.id, id: one.id, part: one.part, name: one.name, address: one.address ?? '', email: one.email ?? '', phone: one.phone ?? '',
      bornOn: one.bornOn ?? '', diedOn: one.diedOn ?? '', isMinor: one.isMinor, isMe: one.isMe,
    })),
  }
}

/** What of a value decides whether it was changed: a person's key is the form's own, and a space that is just typed is no change. */
const plain = (value: unknown) => JSON.stringify(Array.isArray(value) ? (value as PersonDraft[]).map(({ key: _, id: __, ...rest }) => rest) : value,
  (_, part: unknown) => typeof part === 'string' ? part.trim() : part)
const copy = <T>(value: T): T => JSON.parse(JSON.stringify(value)) as T

function sent(name: FactName, values: FactsDraft): unknown {
  const value = values[name]
  if (name === 'people') return values.people.filter(one => one.id || one.name.trim() !== '').map(({ key: _, bornOn, diedOn, ...rest }) => ({ ...rest, bornOn: bornOn || null, diedOn: diedOn || null }))
  if (name === 'takenOn') return value === '' ? 'unknown' : value
  if (name === 'guided') return value === '' ? null : value === 'yes'
  return value === '' ? null : value
}

const REST_MS = 700

/**
 * Facts and people of an entry that save themselves when the hand rests. What somebody else changed meanwhile is taken
 * over where it was not touched here, and laid side by side where it was.
 */
export function useEntryFacts(entry: Ref<EntryAnswer>) {
  const { t } = useI18n()
  const values = reactive(draftOf(entry.value))
  let base = draftOf(entry.value)
  const state = ref<'saved' | 'dirty' | 'saving' | 'failed' | 'incomplete' | 'conflict'>('saved')
  const message = ref('')
  const errors = ref<Record<string, string>>({})
  const conflicts = ref<FactName[]>([])
  const newer = shallowRef<EntryAnswer | null>(null)
  const choices = reactive<Record<string, 'mine' | 'theirs'>>({})
  let timer: ReturnType<typeof setTimeout> | undefined
  let saving: Promise<boolean> | null = null

  const names = Object.keys(base) as FactName[]
  const dirty = () => names.filter(name => plain(values[name]) !== plain(base[name]))

  /** Takes over what the server has, where it was not changed here. */
  function takeOver(next: EntryAnswer, keep: readonly FactName[]) {
    const fresh = draftOf(next)
    for (const name of names) {
      if (keep.includes(name)) continue
      if (name === 'people') takePeople(fresh.people)
      else if (plain(values[name]) !== plain(fresh[name])) Object.assign(values, { [name]: copy(fresh[name]) })
    }
    base = fresh
  }
  /** Fields that are open keep their place: a person who was just added gets its id, not another form. */
  function takePeople(people: readonly PersonDraft[]) {
    const before = [...values.people]
    const known = (one: PersonDraft) => before.find(other => other.id === one.id) ?? before.find(other => !other.id && other.part === one.part && other.name.trim() === one.name)
    const blank = before.filter(one => !one.id && one.name.trim() === '')
    values.people = [...people.map((one) => {
      const here = known(one)
      return here && plain([here]) === plain([one]) ? { ...copy(here), id: one.id } : { ...copy(one), key: here?.key ?? one.key }
    }), ...blank]
  }
  watch(entry, (next, last) => { if (next.version !== last.version) takeOver(next, dirty()) })

  async function send(only: readonly FactName[]): Promise<boolean> {
    const snapshot = copy(values) as FactsDraft
    const body = Object.fromEntries(only.map(name => [name, sent(name, snapshot)]))
    try {
      const next = await api<EntryAnswer>(`/api/entries/${entry.value.id}`, { method: 'PATCH', body, ifMatch: entry.value.version })
      errors.value = {}
      // What was typed while it was under way stays and goes with the next saving.
      const typedSince = names.filter(name => plain(values[name]) !== plain(snapshot[name]))
      if (typedSince.includes('people')) {
        for (const one of values.people) one.id ??= next.people.find(other => other.part === one.part && !values.people.some(known => known.id === other.id))?.id
      }
      takeOver(next, typedSince)
      entry.value = next
      return true
    }
    catch (error) {
      if (!(error instanceof ApiError)) throw error
      const current = error.problem.current as EntryAnswer | undefined
      if (error.problem.code === 'precondition_failed' && current) return meet(current, only)
      message.value = error.problem.detail
      errors.value = Object.fromEntries(error.problem.errors.map(field => [field.path, field.message]))
      state.value = 'failed'
      return false
    }
  }

  /** Somebody saved first: the same facts are laid side by side, others go together. */
  async function meet(current: EntryAnswer, only: readonly FactName[]): Promise<boolean> {
    const theirs = draftOf(current)
    const both = only.filter(name => plain(theirs[name]) !== plain(base[name]) && plain(theirs[name]) !== plain(values[name]))
    if (both.length === 0) {
      takeOver(current, only)
      entry.value = current
      return send(only)
    }
    for (const name of both) choices[name] = 'mine'
    newer.value = current
    conflicts.value = both
    state.value = 'conflict'
    return false
  }
  async function settle() {
    const current = newer.value
    if (!current) return
    const keep = dirty().filter(name => !conflicts.value.includes(name) || choices[name] === 'mine')
    takeOver(current, keep)
    entry.value = current
    conflicts.value = []
    newer.value = null
    state.value = 'dirty'
    await save()
  }

  /** Saves what has changed; true when all is saved. */
  async function save(): Promise<boolean> {
    clearTimeout(timer)
    if (saving) await saving
    if (state.value === 'conflict') return false
    let changed = dirty()
    if (values.people.some(one => one.id && one.name.trim() === '')) {
      changed = changed.filter(name => name !== 'people')
      if (changed.length === 0) {
        state.value = 'incomplete'
        return false
      }
    }
    if (changed.length === 1 && changed[0] === 'people' && plain(sent('people', values)) === plain(sent('people', base))) {
      state.value = 'saved'
      return true
    }
    if (changed.length === 0) {
      state.value = 'saved'
      return true
    }
    state.value = 'saving'
    saving = send(changed)
    const done = await saving
    saving = null
    if (!done) return false
    const left = dirty().filter(name => name !== 'people' || plain(sent('people', values)) !== plain(sent('people', base)))
    state.value = left.length === 0 ? 'saved' : 'dirty'
    if (left.length > 0) later()
    return left.length === 0
  }
  function later() {
    clearTimeout(timer)
    timer = setTimeout(() => void save(), REST_MS)
  }
  watch(values, () => {
    if (state.value === 'conflict' || dirty().length === 0) return
    if (state.value !== 'saving') state.value = 'dirty'
    later()
  }, { deep: true })

  const unsaved = computed(() => state.value !== 'saved')
  function leaving(event: BeforeUnloadEvent) {
    if (unsaved.value && dirty().length > 0) event.preventDefault()
  }
  const again = () => { if (state.value === 'failed') void save() }
  onMounted(() => {
    window.addEventListener('beforeunload', leaving)
    window.addEventListener('online', again)
  })
  onBeforeUnmount(() => {
    clearTimeout(timer)
    window.removeEventListener('beforeunload', leaving)
    window.removeEventListener('online', again)
  })
  onBeforeRouteLeave(async () => {
    if (await save()) return true
    return window.confirm(t('entry.saving.leave'))
  })
  return { values, state, message, errors, conflicts, newer, choices, save, settle, draftOf }
}
export type EntryFactsForm = ReturnType<typeof useEntryFacts>
