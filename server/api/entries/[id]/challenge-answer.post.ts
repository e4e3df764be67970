import { challengeAnswer, entryParams } from '#shared/schemas/sittings'
import { answerChallenge } from '../../../services/panel/challenges'
import { defineRoute } from '../../../utils/defineRoute'

/** The entrant's answer to a challenge. */
export default defineRoute({
  access: { note: 'the entry\'s owner' },
  params: entryParams,
  body: challengeAnswer,
  handler: async ({ registry, actor, params, body }) => {
    await answerChallenge(registry, actor, params.id, body.text)
    return { ok: true }
  },
})
