import { Mark, type MarkShape } from '@/components/ui/mark'
import { TONE_TEXT, type Tone } from '@/components/ui/tag'
import { cn } from '@/lib/shared/cn'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import type { ScreenVerdict } from '@/lib/weaning/screen/verdict'
import type { ScreenResult } from '@/lib/weaning/vocabulary'
import { CRITERION_WORDS, SCREEN_RESULT_WORDS } from '@/lib/weaning/words'

export const RESULT_LOOK: Record<ScreenResult, { shape: MarkShape; tone: Tone }> = {
  ready: { shape: 'tick', tone: 'calm' },
  not_ready: { shape: 'cross', tone: 'stop' },
  incomplete: { shape: 'ring', tone: 'wait' },
  excused: { shape: 'dash', tone: 'muted' },
}

/** The verdict as it stands while one types: the result, and which criteria stand against it. Spoken when it changes. */
export function VerdictPanel({ verdict, unconfirmedCount }: { verdict: ScreenVerdict; unconfirmedCount: number }) {
  const look = RESULT_LOOK[verdict.result]
  return (
    <div role="status" aria-label="Verdict as typed so far" className="tablet:text-right">
      <p className={cn('flex items-center gap-2.5 text-xl font-bold tablet:justify-end', TONE_TEXT[look.tone])}>
        <Mark shape={look.shape} />
        {sentenceCase(SCREEN_RESULT_WORDS[verdict.result])}
      </p>
      {reasonLines(verdict).map((line) => (
        <p key={line} className="text-sm text-muted">
          {line}
        </p>
      ))}
      {unconfirmedCount > 0 ? (
        <p className="text-sm text-muted">
          {unconfirmedCount === 1 ? '1 value' : `${unconfirmedCount} values`} carried over, to be confirmed
        </p>
      ) : null}
    </div>
  )
}

/** "Not met: FiO2, PEEP" and "2 not assessed: cough, RASS". */
export function reasonLines(verdict: ScreenVerdict): string[] {
  const named = (mark: 'not_met' | 'not_assessed') =>
    verdict.criteria.filter((each) => each.mark === mark).map((each) => CRITERION_WORDS[each.criterion])
  const notMet = named('not_met')
  const notAssessed = named('not_assessed')
  const lines: string[] = []
  if (notMet.length > 0) lines.push(`Not met: ${notMet.join(', ')}`)
  if (notAssessed.length > 0) lines.push(`${notAssessed.length} not assessed: ${notAssessed.join(', ')}`)
  return lines.length > 0 ? lines : ['All criteria of the unit are met']
}
