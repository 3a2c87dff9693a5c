import { EntryMeta } from '@/components/episodes/entry-meta'
import { Tag } from '@/components/ui/tag'
import { clockTime } from '@/lib/client/wall-clock'
import type { ScreenFormDto } from '@/lib/schemas/screens'
import { EXCUSE_WORDS, SCREEN_RESULT_WORDS } from '@/lib/weaning/words'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { reasonLines, RESULT_LOOK } from './verdict-panel'

/** Screens already recorded on this ventilator day, latest first. */
export function EarlierScreens({ form }: { form: ScreenFormDto }) {
  if (form.screens.length === 0) return null
  const { timeZone } = form.patient
  return (
    <section className="mt-10" aria-labelledby="earlier-screens">
      <h2 id="earlier-screens" className="mb-2 text-lg font-bold">
        Recorded today
      </h2>
      <ul className="flex flex-col">
        {form.screens.map((screen) => (
          <li key={screen.id} className="border-t border-line py-3">
            <p className="flex flex-wrap items-baseline gap-x-3">
              <span className="figure text-lg font-semibold">{clockTime(screen.observedAt, timeZone, form.nowMs)}</span>
              <Tag {...RESULT_LOOK[screen.result]}>{sentenceCase(SCREEN_RESULT_WORDS[screen.result])}</Tag>
              <span className="text-muted">
                {screen.excuse ? EXCUSE_WORDS[screen.excuse] : screen.verdict ? reasonLines(screen.verdict).join('. ') : ''}
              </span>
            </p>
            <EntryMeta entry={screen} timeZone={timeZone} nowMs={form.nowMs} />
          </li>
        ))}
      </ul>
    </section>
  )
}
