import { EntryMeta } from '@/components/episodes/entry-meta'
import { Tag, type Tone } from '@/components/ui/tag'
import type { MarkShape } from '@/components/ui/mark'
import { clockTime } from '@/lib/client/wall-clock'
import type { HoldDto } from '@/lib/schemas/holds'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { HOLD_OUTCOME_WORDS, HOLD_SAFETY_WORDS, HOLD_START_WORDS } from '@/lib/weaning/words'
import { HOLD_SAFETY_ITEMS, type HoldOutcome, type HoldStart } from '@/lib/weaning/vocabulary'
import { RestartList } from './restart-list'

/** Mark and tone of a hold by its outcome, or by how it began. */
export function holdLook(start: HoldStart, outcome: HoldOutcome | null): { shape: MarkShape; tone: Tone; words: string } {
  if (start === 'not_needed') return { shape: 'dash', tone: 'muted', words: `Hold ${HOLD_START_WORDS.not_needed}` }
  if (start === 'unsafe') return { shape: 'cross', tone: 'stop', words: `Hold ${HOLD_START_WORDS.unsafe}` }
  if (outcome === null) return { shape: 'hatch', tone: 'dawn', words: 'Hold running' }
  const words = `Hold ${HOLD_OUTCOME_WORDS[outcome]}`
  if (outcome === 'tolerated') return { shape: 'tick', tone: 'calm', words }
  return outcome === 'not_tolerated' ? { shape: 'cross', tone: 'stop', words } : { shape: 'square', tone: 'wait', words }
}

/** Holds already recorded on this ventilator day, latest first. */
export function EarlierHolds({ holds, timeZone, nowMs }: { holds: readonly HoldDto[]; timeZone: string; nowMs: number }) {
  if (holds.length === 0) return null
  return (
    <section className="mt-10" aria-labelledby="earlier-holds">
      <h2 id="earlier-holds" className="mb-2 text-lg font-bold">
        Recorded today
      </h2>
      <ul>
        {holds.map((hold) => {
          const look = holdLook(hold.start, hold.end?.outcome ?? null)
          const present = HOLD_SAFETY_ITEMS.filter((item) => hold.safety?.[item] === true)
          const details = [
            ...present.map((item) => HOLD_SAFETY_WORDS[item]),
            ...(hold.end?.rulesMet.map(({ words }) => words) ?? []),
            hold.note,
            hold.end?.note,
          ].filter(Boolean)
          return (
            <li key={hold.id} className="border-t border-line py-3">
              <p className="flex flex-wrap items-baseline gap-x-3">
                <span className="figure text-lg font-semibold">
                  {clockTime(hold.observedAt, timeZone, nowMs)}
                  {hold.end ? `–${clockTime(hold.end.observedAt, timeZone, nowMs)}` : ''}
                </span>
                <Tag shape={look.shape} tone={look.tone}>
                  {look.words}
                </Tag>
                <span className="text-muted">{details.map((each) => sentenceCase(each ?? '')).join('. ')}</span>
              </p>
              {hold.end?.outcome === 'not_tolerated' ? <RestartList restarts={hold.end.restarts} fraction={null} /> : null}
              <EntryMeta entry={hold} timeZone={timeZone} nowMs={nowMs} />
            </li>
          )
        })}
      </ul>
    </section>
  )
}
