/** A key and what it does. `key` is what the keyboard event says: `j`, `Enter`, `?`. */
export type Shortcuts = Readonly<Record<string, (event: KeyboardEvent) => void>>

const KEPT = 'hartroll.keys'
const TYPING = 'input, textarea, select, [contenteditable], dialog[open]'

/** Whether single keys act at all: somebody who speaks to the machine or rests a hand on it switches them off (WCAG 2.2, 2.1.4). */
export function useKeysOn() {
  const on = useState('keys-on', () => true)
  onMounted(() => { on.value = localStorage.getItem(KEPT) !== 'off' })
  function set(value: boolean) {
    on.value = value
    localStorage.setItem(KEPT, value ? 'on' : 'off')
  }
  return { on, set }
}

/** Keys of a page. They never act while somebody types, with a modifier held, or over an open dialog. */
export function useShortcuts(shortcuts: Shortcuts) {
  const { on } = useKeysOn()
  function press(event: KeyboardEvent) {
    if (!on.value || event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey) return
    if ((event.target as Element | null)?.closest?.(TYPING) || document.querySelector('dialog[open]')) return
    const act = shortcuts[event.key]
    if (!act) return
    event.preventDefault()
    act(event)
  }
  onMounted(() => window.addEventListener('keydown', press))
  onBeforeUnmount(() => window.removeEventListener('keydown', press))
}

/** Moves the focus by `step` among the elements that a selector finds, and stays at the ends. */
export function moveFocus(selector: string, step: 1 | -1) {
  const all = [...document.querySelectorAll<HTMLElement>(selector)]
  const at = all.findIndex(one => one === document.activeElement || one.contains(document.activeElement))
  const next = all[at === -1 ? (step === 1 ? 0 : all.length - 1) : Math.min(all.length - 1, Math.max(0, at + step))]
  next?.focus()
  next?.scrollIntoView({ block: 'nearest' })
}
