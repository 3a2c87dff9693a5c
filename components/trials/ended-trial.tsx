import { EntryMeta } from '@/components/episodes/entry-meta'
import { ObservationTable } from '@/components/episodes/observation-table'
import { Tag } from '@/components/ui/tag'
import { clockTime } from '@/lib/client/wall-clock'
import { formatDuration } from '@/lib/shared/format'
import type { TrialDto } from '@/lib/schemas/trials'
import type { StopRule } from '@/lib/weaning/protocol'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { RateChart } from './rate-chart'
import { techniqueText } from './technique-text'
import { trialLook } from './trial-look'

type Props = { trial: TrialDto; rules: readonly StopRule[]; timeZone: string; nowMs: number }

/** A trial that has ended: outcome, what ended it, and every observation. */
export function EndedTrial({ trial, rules, timeZone, nowMs }: Props) {
  const { end } = trial
  if (end === null) return null
  const look = trialLook(end.outcome)
  const time = (ms: number) => clockTime(ms, timeZone, nowMs)
  return (
    <article className="border-t border-line py-4">
      <h3 className="flex flex-wrap items-baseline gap-x-3">
        <span className="figure text-lg font-semibold">
          {time(trial.observedAt)}–{time(end.observedAt)}
        </span>
        <Tag shape={look.shape} tone={look.tone} className="text-lg">
          {look.words}
        </Tag>
        <span className="text-muted">after {formatDuration(end.observedAt - trial.observedAt)}</span>
      </h3>
      <p>{sentenceCase(techniqueText(trial))}</p>
      {end.rulesMet.length > 0 ? <p>Stop rules met: {end.rulesMet.map(({ words }) => words).join('; ')}.</p> : null}
      {end.reason ? <p>{sentenceCase(end.reason)}</p> : null}
      {end.returnedTo ? <p className="text-muted">Afterwards: {end.returnedTo}</p> : null}
      {trial.startedAnywayBecause ? (
        <p className="text-muted">Started against the order of the day: {trial.startedAnywayBecause}</p>
      ) : null}
      <EntryMeta entry={end} timeZone={timeZone} nowMs={nowMs} />
      <details>
        <summary className="min-h-[44px] cursor-pointer py-2.5 underline decoration-line decoration-2 underline-offset-4">
          {trial.observations.length} {trial.observations.length === 1 ? 'observation' : 'observations'}
        </summary>
        <div className="flex flex-col gap-6 pt-3">
          <RateChart trial={trial} rules={rules} untilMs={end.observedAt} isRunning={false} />
          <ObservationTable
            rows={trial.observations}
            caption={`Observations of the trial at ${time(trial.observedAt)}`}
            timeZone={timeZone}
            nowMs={nowMs}
          />
        </div>
      </details>
    </article>
  )
}
