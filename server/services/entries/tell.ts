import type { Knex } from 'knex'
import { stakesOf } from '../../../shared/domain/access/stakes'
import type { EffectName } from '../../../shared/domain/workflow/effects'
import { listAddressees, listHolders } from '../../repositories/addressees'
import { findDistrictById } from '../../repositories/catalogue'
import { findOpenItem, findSittingById, listChallenges, listJudges } from '../../repositories/panel'
import { findAccounts } from '../../repositories/stakes'
import type { NoticeValue } from '../notices/queue'
import { queueNotice } from '../notices/queue'
import { TEMPLATES, templateFor } from '../notices/templates'
import { keysOf } from './context'
import type { EffectContext } from './effects/context'
import { sayNet } from './say'

type Audience = 'entrant' | 'measurer' | 'former_measurer' | 'office' | 'judges' | 'reporter' | 'holder'

/** Judges of the sitting that has the entry, those with a stake apart: they are told nothing of it. */
async function judgesOf(trx: Knex, { context }: EffectContext): Promise<number[]> {
  const item = await findOpenItem(trx, context.entry.id) ?? context.item
  if (!item?.sitting_id) return []
  const judges = await listJudges(trx, item.sitting_id)
  const accounts = await findAccounts(trx, judges.map(judge => judge.user_id))
  return accounts.filter(account => stakesOf(context.stakes, keysOf(account), 'vote').length === 0).map(account => account.id)
}

async function holderOf(trx: Knex, { context, facts }: EffectContext): Promise<number[]> {
  const { entry, item } = context
  const ids: (number | null | undefined)[] = facts.state === 'measuring' ? [entry.measurer_user_id] : facts.state === 'in_review' ? [entry.reviewer_user_id] : []
  if (item?.sitting_id) ids.push((await findSittingById(trx, item.sitting_id))?.chair_user_id)
  return ids.filter(id => id !== null && id !== undefined)
}

const WHO: Readonly<Record<Audience, (trx: Knex, effect: EffectContext) => Promise<(number | null)[]> | (number | null)[]>> = {
  entrant: (_, { context, patch }) => [(patch.owner_user_id as number | undefined) ?? context.entry.owner_user_id],
  measurer: (_, { context, patch }) => [(patch.measurer_user_id as number | undefined) ?? context.entry.measurer_user_id],
  former_measurer: (_, { holders }) => holders,
  office: (trx, { moment }) => listHolders(trx, 'reviewer', moment.at),
  judges: judgesOf,
  reporter: async (trx, { context }) => (await listChallenges(trx, context.entry.id)).filter(one => one.outcome !== null).slice(-1).map(one => one.reporter_user_id),
  holder: holderOf,
}

async function sayings(effect: EffectContext): Promise<Record<string, NoticeValue>> {
  const { trx, context, facts, input, move, says } = effect
  const { entry, category } = context
  const [owner] = entry.owner_user_id === null ? [] : await findAccounts(trx, [entry.owner_user_id])
  const district = entry.district_id === null ? undefined : await findDistrictById(trx, entry.district_id)
  const { decision } = facts
  return {
    animal: { text: `animals.classes.${category.code}` },
    entrant: owner?.name ?? null,
    district: district?.name ?? null,
    comment: input.comment ?? null,
    reason: decision?.reason ?? null,
    ground: decision?.ground ? { text: `names.grounds.${decision.ground}` } : null,
    deadline: move.dueOn === null ? null : { day: move.dueOn },
    minimum: facts.minimum16 === null ? null : sayNet(facts.minimum16, category.step),
    net: entry.net16 === null ? null : sayNet(entry.net16, category.step),
    text: input.text ?? null,
    state: { text: `states.${move.to}.name` },
    ...says,
  }
}

function audienceOf(name: EffectName): Audience | null {
  if (!name.startsWith('tell_')) return null
  const audience = name.slice('tell_'.length)
  return audience in WHO ? audience as Audience : null
}

/**
 * Writes the notices of a move into the outbox. Nobody is told of their own act; only the entrant gets a receipt for one.
 */
export async function tellAll(effect: EffectContext): Promise<void> {
  const { trx, move, actor, moment, context } = effect
  const audiences = move.effects.map(audienceOf).filter(audience => audience !== null)
  if (audiences.length === 0) return
  const values = await sayings(effect)
  for (const audience of audiences) {
    const ids = (await WHO[audience](trx, effect)).filter(id => id !== null && (audience === 'entrant' || id !== actor?.userId)) as number[]
    const template = templateFor(move.row.code, audience)
    const variables = TEMPLATES[template].variables as readonly string[]
    for (const person of await listAddressees(trx, [...new Set(ids)])) {
      const said = { ...values, name: person.name }
      const args = Object.fromEntries(Object.entries(said).filter(([name]) => variables.includes(name)))
      await queueNotice(trx, moment.now, { template, toEmail: person.email, userId: person.id, entryId: context.entry.id, args, locale: person.locale })
    }
  }
}
