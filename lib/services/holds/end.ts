import 'server-only'
import { findHoldEndVersion, insertHoldEnd } from '@/db/queries/holds'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { EndedHoldDto, EndHoldInput } from '@/lib/schemas/holds'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatDuration, formatTime } from '@/lib/shared/format'
import { MINUTE_MS } from '@/lib/shared/time'
import { isTolerated } from '@/lib/weaning/hold/is-tolerated'
import { HOLD_OUTCOME_WORDS } from '@/lib/weaning/words'
import { placeEntry } from '../entries/place-entry'
import { idsOfRulesMet, joinNamedRules, nameRules } from '../steps/judged-rules'
import { refuseEndTooEarly } from '../steps/refuse-outside-step'
import { refuseOverlap } from '../steps/refuse-overlap'
import { holdAtHand, listHoldIntervals } from './hold-at-hand'
import { computeRestarts } from './restarts'

type AtHand = ReturnType<typeof holdAtHand>

/**
 * Records the end of a sedation hold. Rules met come from the observations and from what the person names. After a hold that was not
 * tolerated the answer holds, for each sedative infusion, the protocol's fraction of the rate before: information, not an order.
 */
export function endHold(ctx: Ctx, input: EndHoldInput): EndedHoldDto {
  const found = authorize(ctx, 'hold.end', { episodeId: input.episodeId })
  return once(ctx, 'hold.end', input, (tx) => {
    const { observed, amends, outcome, note } = input
    const atHand = holdAtHand(tx, found.episode.id, input.holdId)
    const { hold, observations, end, protocol } = atHand
    const words = { timeZone: found.unit.timeZone, now: ctx.now }
    if (!amends) refuseEndedTwice(end, words)
    const earlier = amends ? findHoldEndVersion(tx, amends.id) : undefined
    if (earlier && earlier.row.holdId !== hold.row.entryId) throw new AppError('NOT_FOUND', 'The entry to correct was not found.')
    const { columns } = placeEntry(tx, ctx, found, { observed, amends, findAmended: () => earlier })
    const startMs = hold.row.observedAt
    const lastLookMs = observations.at(-1)?.row.observedAt ?? null
    refuseEndTooEarly(columns.observedAt, { startMs, lastLookMs }, { what: 'hold', ...words })
    const own = { entryId: hold.row.entryId, startMs, endMs: columns.observedAt }
    refuseOverlap(own, listHoldIntervals(tx, found.episode.id), { what: 'a sedation hold', ...words })
    const rules = protocol.content.hold.failRules
    const met = idsOfRulesMet(rules, null, observations, Math.max(columns.observedAt, lastLookMs ?? 0))
    const rulesMet = joinNamedRules(rules, met, input.rulesMet)
    requireGrounds(atHand, input, { endedAt: columns.observedAt, rulesMet })
    const isRestarted = outcome === 'not_tolerated'
    const restarts = isRestarted ? computeRestarts(hold.row.infusions, protocol.content.hold.restartFraction) : []
    const row = insertHoldEnd(tx, {
      ...columns,
      protocolVersionId: protocol.id,
      holdId: hold.row.entryId,
      outcome,
      rulesMet,
      restarts,
      note,
    })
    const action = amends ? 'hold.amend_end' : 'hold.end'
    writeAudit(tx, ctx, { action, unitId: columns.unitId, subject: { kind: 'hold_end', id: row.id }, after: row })
    return { id: row.id, outcome: row.outcome, restarts }
  })
}

function refuseEndedTwice(end: AtHand['end'], { timeZone, now }: { timeZone: string; now: number }): void {
  if (!end) return
  const at = formatTime(end.row.observedAt, timeZone, now)
  const result = HOLD_OUTCOME_WORDS[end.row.outcome]
  throw new AppError('CONFLICT', `${end.recordedByName} recorded the end of this hold at ${at}: ${result}. Nothing was recorded.`)
}

/** An outcome that the record does not bear out needs a reason in words. */
function requireGrounds(
  { hold, observations, protocol }: AtHand,
  { outcome, note }: EndHoldInput,
  { endedAt, rulesMet }: { endedAt: number; rulesMet: string[] },
): void {
  const { failRules, toleratedAfterMin } = protocol.content.hold
  if ((note ?? '').length >= 3) return
  if (outcome === 'not_tolerated' && rulesMet.length === 0) {
    throw invalidField('rulesMet', 'No limit is met so far. Say which one was, or describe in the note what was seen.')
  }
  if (outcome !== 'tolerated') return
  if (rulesMet.length > 0) {
    const named = nameRules(failRules, rulesMet).map(({ words }) => words)
    throw invalidField('note', `A limit was met: ${named.join('; ')}. Say in the note why the hold still counts as tolerated.`)
  }
  const opensEyesToVoice = observations.some(({ row }) => row.opensEyesToVoice === 'yes' && row.observedAt <= endedAt)
  const grounds = { startedMs: hold.row.observedAt, atMs: endedAt, opensEyesToVoice, failRulesMet: rulesMet, toleratedAfterMin }
  if (isTolerated(grounds)) return
  const long = formatDuration(toleratedAfterMin * MINUTE_MS)
  throw invalidField(
    'note',
    `Neither eyes open to voice nor ${long} without a limit met stands in the record. Record that look first, or say in the note why it counts as tolerated.`,
  )
}
