/** Whose turn an entry is, in words for its entrant: where it stands, until when, what is wanted, and what may be done. */
export function useEntryTurn(entry: Ref<EntryAnswer>) {
  const { t } = useI18n()
  const words = useDeskWords()
  const { guard } = useEntryWords()

  const act = (code: string) => entry.value.next.find(one => one.transition === code && one.stakes.length === 0)
  const measurerAct = computed(() => act('ask_measurer') ?? act('reassign'))
  const forward = computed(() => act('submit') ?? act('resubmit'))
  /** Nobody is asked for leave where none is needed: asking is for an entry that cannot be withdrawn at once. */
  const others = computed(() => ['revive', 'appeal', 'appeal_strike', 'reopen', act('withdraw') ? 'withdraw' : 'ask_withdrawal'].flatMap(code => act(code) ?? []))

  const stands = computed(() => entry.value.state === 'measuring' && !entry.value.measurer
    ? t('entry.stands.measuringNobody')
    : t(`entry.stands.${entry.value.state}`, { measurer: entry.value.measurer?.name ?? '' }))
  const due = computed(() => {
    const { dueOn, daysLeft, state } = entry.value
    if (dueOn === null || daysLeft === null || !['certified', 'returned', 'declined', 'struck', 'challenged'].includes(state)) return null
    return t(`entry.due.${state}`, { date: words.date(dueOn), left: words.left(daysLeft) })
  })

  /** What is wanted from the entrant, each with the part of the page where it is done. */
  const wants = computed(() => {
    const list: { part: string, text: string }[] = []
    const way = forward.value ?? (entry.value.state === 'draft' ? measurerAct.value : undefined)
    for (const request of entry.value.requests) {
      if (entry.value.state === 'returned' && request.closedAt === null && request.answeredAt === null) list.push({ part: 'requests', text: t('entry.wanted.request', { text: request.text }) })
    }
    for (const failure of way?.failed ?? []) {
      if (failure.guard !== 'every_request_answered') list.push({ part: partOfGuard(failure), text: guard(failure) })
    }
    if (way && list.length === 0) {
      const done = { submit: 'readySubmit', resubmit: 'readyResubmit', ask_measurer: 'readyAsk' }[way.transition]
      if (done) list.push({ part: way.transition === 'ask_measurer' ? 'measurer' : 'acts', text: t(`entry.wanted.${done}`) })
    }
    return list
  })
  return { measurerAct, forward, others, stands, due, wants }
}
