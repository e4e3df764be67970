import type { Knex } from 'knex'
import { addDays, type Day } from '#shared/domain/dates'
import { sqlTime } from '../../db/time'
import { insertMany, nextId } from '../bulk'
import { sittingDays } from './clock'
import type { DemoPerson, Staff } from './people'
import { type Random, uidAt } from './random'
import { DISTRICTS, FIRST_DAY } from './society'

export interface PastSitting {
  readonly id: number
  readonly day: Day
  readonly chair: DemoPerson
  /** the chair among them */
  readonly judges: readonly DemoPerson[]
  /** how many entries are on its docket so far */
  items: number
}

/** The closed sittings since entries are kept by this program, with a chair in turn and five judges each. */
export async function seedPastSittings(db: Knex, staff: Staff, until: Day, random: Random): Promise<Map<Day, PastSitting>> {
  const first = await nextId(db, 'sittings')
  const days = sittingDays(Number(FIRST_DAY.slice(0, 4)), until).filter(day => day > FIRST_DAY)
  const sittings = days.map((day, place): PastSitting => {
    const chair = staff.judges[place % 3]!
    const others = staff.judges.filter(judge => judge !== chair)
    const from = random.whole(0, others.length - 1)
    return { id: first + place, day, chair, judges: [chair, ...[0, 1, 2, 3].map(step => others[(from + step) % others.length]!)], items: 0 }
  })
  await insertMany(db, 'sittings', sittings.map(({ id, day, chair }) => {
    const planned = new Date(`${addDays(day, -40)}T18:00:00.000Z`)
    return {
      id,
      uid: uidAt(planned, random),
      held_on: day,
      place: `Hall of ${random.pick(DISTRICTS).name}`,
      chair_user_id: chair.userId,
      state: 'closed',
      created_at: sqlTime(planned),
      opened_at: sqlTime(new Date(`${day}T15:00:00.000Z`)),
      closed_at: sqlTime(new Date(`${day}T23:30:00.000Z`)),
      closed_by: chair.userId,
    }
  }))
  await insertMany(db, 'sitting_judges', sittings.flatMap(({ id, day, judges }) => judges.map(judge => ({
    sitting_id: id, user_id: judge.userId, invited_at: sqlTime(new Date(`${addDays(day, -40)}T18:00:00.000Z`)), present: 1,
  }))))
  return new Map(sittings.map(sitting => [sitting.day, sitting]))
}
