import { inTransaction } from '../../../db/transaction'
import { addDays } from '../../../shared/domain/dates'
import { reminderDue } from '../../../shared/domain/workflow/reminders'
import { isDomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { listAddressees } from '../../repositories/addressees'
import { findClassById } from '../../repositories/catalogue'
import { findEntry, listOverdue, listRunningTerms, lockEntry, type DueEntry } from '../../repositories/entries'
import { listJudges } from '../../repositories/panel'
import { listComingSittings, listEndingAccreditations, takeReminder } from '../../repositories/reminders'
import { momentOf, type Moment } from '../moment'
import { queueNotice, type NoticeValue } from '../notices/queue'
import type { TemplateName } from '../notices/templates'
import { applyDecisions } from '../panel/close'
import { loadCurrentWorkflow, loadWorkflow } from '../workflow/load'
import { ANY_VERSION, performMove } from './move'

const BATCH = 200

export interface ClockRound {
  readonly lapsed: number
  readonly reminded: number
  readonly applied: number
}

/**
 * What happens by the clock alone: terms that are over, reminders, decisions of a closed sitting that were not carried out. Every
 * entry is its own transaction; safe to repeat, and to run in several workers at once.
 */
export async function runClock(registry: Registry): Promise<ClockRound> {
  const moment = await momentOf(registry)
  return {
    applied: await applyDecisions(registry),
    lapsed: await lapseOverdue(registry, moment),
    reminded: await remindEntrants(registry, moment) + await remindMeasurers(registry, moment) + await remindJudges(registry, moment),
  }
}

async function lapseOverdue(registry: Registry, moment: Moment): Promise<number> {
  let lapsed = 0
  for (const { uid } of await listOverdue(registry.db, moment.today, BATCH)) {
    try {
      await inTransaction(registry.db, async (trx) => {
        const entry = (await lockEntry(trx, uid))!
        const workflow = await loadWorkflow(trx, entry.workflow_version_id)
        const row = workflow.rows.find(one => one.parties.includes('clock') && one.from.includes(entry.state))
        if (!row) return
        await performMove({ trx, entry, performer: { kind: 'clock' }, input: { transition: row.code, version: ANY_VERSION }, moment, passwordVerified: false }, workflow)
        lapsed++
      })
    }
    catch (error) {
      // touched, answered or put on hold meanwhile: then its term is not over
      if (!isDomainError(error) || (error.code !== 'guard_failed' && error.code !== 'wrong_state')) throw error
    }
  }
  return lapsed
}

async function tell(registry: Registry, key: { task: string, period: string }, userIds: readonly number[], template: TemplateName, args: Record<string, NoticeValue>, entryId: number | null, moment: Moment): Promise<number> {
  return inTransaction(registry.db, async (trx) => {
    if (!await takeReminder(trx, key.task, key.period, moment.at)) return 0
    const people = await listAddressees(trx, userIds)
    for (const person of people) {
      await queueNotice(trx, moment.now, { template, toEmail: person.email, userId: person.id, entryId, args: { ...args, name: person.name }, locale: person.locale })
    }
    return people.length
  }).catch((error: unknown) => {
    // another worker was faster
    if (isDomainError(error) && error.code === 'duplicate') return 0
    throw error
  })
}

async function remindOf(registry: Registry, entry: DueEntry, moment: Moment): Promise<number> {
  const { limits } = await loadWorkflow(registry.db, entry.workflow_version_id)
  const due = reminderDue({ state: entry.state, dueOn: entry.due_on!, appealed: entry.appealed_at !== null }, moment.today, limits)
  if (!due) return 0
  const found = await findEntry(registry.db, entry.uid)
  const category = await findClassById(registry.db, found!.class_id)
  const args = { animal: { text: `animals.classes.${category!.code}` }, deadline: { day: entry.due_on! } }
  return tell(registry, { task: `remind.${entry.uid}`, period: `${entry.due_on}.${due.day}` }, [entry.owner_user_id!], due.reminder, args, entry.id, moment)
}

async function remindEntrants(registry: Registry, moment: Moment): Promise<number> {
  let reminded = 0
  for (let after = 0; ;) {
    const page = await listRunningTerms(registry.db, moment.today, after, BATCH)
    for (const entry of page) reminded += await remindOf(registry, entry, moment)
    if (page.length < BATCH) return reminded
    after = page.at(-1)!.id
  }
}

async function remindMeasurers(registry: Registry, moment: Moment): Promise<number> {
  const { limits } = await loadCurrentWorkflow(registry.db)
  let reminded = 0
  for (const one of await listEndingAccreditations(registry.db, moment.today, addDays(moment.today, limits.accreditationReminderDays))) {
    reminded += await tell(registry, { task: `remind.accreditation.${one.id}`, period: one.valid_to }, [one.user_id], 'accreditation_ends', { deadline: { day: one.valid_to } }, null, moment)
  }
  return reminded
}

async function remindJudges(registry: Registry, moment: Moment): Promise<number> {
  const { limits } = await loadCurrentWorkflow(registry.db)
  let reminded = 0
  for (const sitting of await listComingSittings(registry.db, moment.today, addDays(moment.today, limits.sittingReminderDays))) {
    const judges = (await listJudges(registry.db, sitting.id)).map(judge => judge.user_id)
    reminded += await tell(registry, { task: `remind.sitting.${sitting.id}`, period: sitting.held_on }, judges, 'sitting_in_days', { sitting: { day: sitting.held_on }, place: sitting.place }, null, moment)
  }
  return reminded
}
