import { Notice } from '@/components/ui/notice'
import { clockTime } from '@/lib/client/wall-clock'
import { formatDuration } from '@/lib/shared/format'
import type { TrialReadinessDto } from '@/lib/schemas/trials'
import { HOLD_OUTCOME_WORDS, HOLD_START_WORDS, SCREEN_RESULT_WORDS } from '@/lib/weaning/words'

type Props = { readiness: TrialReadinessDto; timeZone: string; nowMs: number }

/** What the day's record says before a trial: screen, hold, pairing window, and what is missing. */
export function ReadinessLines({ readiness, timeZone, nowMs }: Props) {
  const { screen, hold, pairingWindowClosesMs: closes } = readiness
  const time = (ms: number) => clockTime(ms, timeZone, nowMs)
  return (
    <div className="mb-6 flex flex-col gap-3">
      <p className="text-muted">
        {screen
          ? `Screen ${time(screen.observedAt)}: ${SCREEN_RESULT_WORDS[screen.result]}, ${screen.recordedByName}`
          : 'Screen: not recorded today'}
        {' · '}
        {hold
          ? `Sedation hold ${time(hold.observedAt)}: ${hold.outcome ? HOLD_OUTCOME_WORDS[hold.outcome] : HOLD_START_WORDS[hold.start]}, ${hold.recordedByName}`
          : 'Sedation hold: not recorded today'}
      </p>
      {closes === null ? null : <PairingWindow closesMs={closes} nowMs={nowMs} at={time(closes)} />}
      {readiness.isInOrder ? null : (
        <Notice tone="stop" title="The day’s record does not lead to a trial yet">
          <ul className="list-disc pl-5">
            {readiness.missing.map((each) => (
              <li key={each}>{each}</li>
            ))}
          </ul>
          <p>Record that first. If the trial starts all the same, say why below; the reason stays in the record.</p>
        </Notice>
      )}
    </div>
  )
}

function PairingWindow({ closesMs, nowMs, at }: { closesMs: number; nowMs: number; at: string }) {
  if (nowMs > closesMs)
    return <p className="font-semibold text-stop">The pairing window with the sedation hold closed at {at}.</p>
  return (
    <p className="font-semibold">
      The pairing window with the sedation hold closes at {at}, in {formatDuration(closesMs - nowMs)}.
    </p>
  )
}
