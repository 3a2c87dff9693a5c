import { ObservationTable } from '@/components/episodes/observation-table'
import { holdLook } from '@/components/holds/earlier-holds'
import { reasonLines, RESULT_LOOK } from '@/components/screens/verdict-panel'
import { RateChart } from '@/components/trials/rate-chart'
import { techniqueText } from '@/components/trials/technique-text'
import { trialLook } from '@/components/trials/trial-look'
import { Tag } from '@/components/ui/tag'
import { Value } from '@/components/ui/value'
import { clockTime, shortDay } from '@/lib/client/wall-clock'
import { formatDuration } from '@/lib/shared/format'
import type { DecisionEvidence, DecisionFormDto } from '@/lib/schemas/decisions'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import {
  COUGH_WORDS,
  EXCUSE_WORDS,
  HOLD_SAFETY_WORDS,
  SCREEN_RESULT_WORDS,
  SECRETIONS_WORDS,
  UNKNOWN_WORDS,
} from '@/lib/weaning/words'
import { HOLD_SAFETY_ITEMS } from '@/lib/weaning/vocabulary'
import { EvidenceLine } from './evidence-line'

type Props = { dto: DecisionFormDto; nowMs: number }
type Part = { evidence: DecisionEvidence; time: (ms: number) => string }

/** Everything that the day's record holds for the decision, brought together; what is missing is named and counts for nothing. */
export function Evidence({ dto, nowMs }: Props) {
  const { evidence, patient } = dto
  const time = (ms: number) => clockTime(ms, patient.timeZone, nowMs)
  const { rsbi, settings, gas, trial } = evidence
  return (
    <section aria-labelledby="evidence">
      <h2 id="evidence" className="mb-2 text-lg font-bold">
        What the record holds
      </h2>
      {evidence.ventilatorDay === dto.ventilatorDay ? null : (
        <p className="mb-2 font-semibold text-stop">
          Nothing of the day’s steps is recorded today: this is what stands for {shortDay(evidence.ventilatorDay)}.
        </p>
      )}
      <dl className="border-b border-line">
        <ScreenLine evidence={evidence} time={time} />
        <HoldLine evidence={evidence} time={time} />
        <TrialLine evidence={evidence} time={time} />
        <EvidenceLine label="RSBI" isMissing={rsbi === null}>
          {rsbi?.value.known ? (
            <>
              <Value value={rsbi.value.value.toFixed(1)} unit="/min/L" size="large" />{' '}
              <span className="text-muted">
                {time(rsbi.observedAt)}, {RSBI_FROM[rsbi.from]}; over 105 was published for one minute without support
              </span>
            </>
          ) : null}
          {rsbi && !rsbi.value.known ? UNKNOWN_WORDS[rsbi.value.reason] : null}
        </EvidenceLine>
        <EvidenceLine label="Blood gas" isMissing={gas === null}>
          {gas ? (
            <p className="flex flex-wrap gap-x-5">
              <Value value={gas.ph.toFixed(2)} unit="pH" />
              <Value value={String(gas.paCO2MmHg)} unit="mmHg PaCO2" />
              <Value value={String(gas.paO2MmHg)} unit={`mmHg PaO2 on FiO2 ${gas.fio2Fraction.toFixed(2)}`} />
              <span className="text-muted">
                {time(gas.observedAt)}, {formatDuration(nowMs - gas.observedAt)} ago
              </span>
            </p>
          ) : null}
        </EvidenceLine>
        <EvidenceLine label="Settings" isMissing={settings === null}>
          {settings ? (
            <>
              {settings.mode}, FiO2 {settings.fio2Fraction.toFixed(2)}, PEEP {settings.peepCmH2O} cmH2O{' '}
              <span className="text-muted">
                {time(settings.observedAt)}, {formatDuration(nowMs - settings.observedAt)} ago
              </span>
            </>
          ) : null}
        </EvidenceLine>
        <EvidenceLine label="Cough" isMissing={evidence.cough === null}>
          {evidence.cough ? COUGH_WORDS[evidence.cough] : null}
        </EvidenceLine>
        <EvidenceLine label="Secretions" isMissing={evidence.secretions === null}>
          {evidence.secretions ? SECRETIONS_WORDS[evidence.secretions] : null}
        </EvidenceLine>
      </dl>
      {trial ? (
        <div className="mt-6 flex flex-col gap-6">
          <RateChart
            trial={trial}
            rules={dto.protocol.content.trial.stopRules}
            untilMs={trial.end?.observedAt ?? nowMs}
            isRunning={trial.end === null}
          />
          <ObservationTable
            rows={trial.observations}
            caption="Observations of the trial"
            timeZone={patient.timeZone}
            nowMs={nowMs}
          />
        </div>
      ) : null}
    </section>
  )
}

const RSBI_FROM = {
  trial: 'from the trial’s last look at rate and volume',
  baseline: 'from the trial’s baseline',
  screen: 'from the screen',
} as const

function ScreenLine({ evidence: { screen }, time }: Part) {
  return (
    <EvidenceLine label="Screen" isMissing={screen === null}>
      {screen ? (
        <>
          <p className="flex flex-wrap gap-x-3">
            <span className="figure">{time(screen.observedAt)}</span>
            <Tag {...RESULT_LOOK[screen.result]}>{sentenceCase(SCREEN_RESULT_WORDS[screen.result])}</Tag>
            <span className="text-muted">{screen.recordedByName}</span>
          </p>
          <p className="text-muted">
            {screen.excuse ? EXCUSE_WORDS[screen.excuse] : screen.verdict ? reasonLines(screen.verdict).join('. ') : ''}
          </p>
        </>
      ) : null}
    </EvidenceLine>
  )
}

function HoldLine({ evidence: { hold }, time }: Part) {
  if (hold === null) return <EvidenceLine label="Sedation hold" isMissing />
  const look = holdLook(hold.start, hold.end?.outcome ?? null)
  const present = HOLD_SAFETY_ITEMS.filter((item) => hold.safety?.[item] === true).map((item) => HOLD_SAFETY_WORDS[item])
  const why = [...present, ...(hold.end?.rulesMet.map(({ words }) => words) ?? []), hold.note, hold.end?.note].filter(Boolean)
  return (
    <EvidenceLine label="Sedation hold">
      <p className="flex flex-wrap gap-x-3">
        <span className="figure">
          {time(hold.observedAt)}
          {hold.end ? `–${time(hold.end.observedAt)}` : ''}
        </span>
        <Tag shape={look.shape} tone={look.tone}>
          {look.words}
        </Tag>
        <span className="text-muted">{hold.recordedByName}</span>
      </p>
      {why.length > 0 ? <p className="text-muted">{why.map((each) => sentenceCase(each ?? '')).join('. ')}</p> : null}
    </EvidenceLine>
  )
}

function TrialLine({ evidence: { trial }, time }: Part) {
  if (trial === null) return <EvidenceLine label="Breathing trial" isMissing />
  const { end } = trial
  const look = trialLook(end?.outcome ?? null)
  return (
    <EvidenceLine label="Breathing trial">
      <p className="flex flex-wrap gap-x-3">
        <span className="figure">
          {time(trial.observedAt)}
          {end ? `–${time(end.observedAt)}` : ''}
        </span>
        <Tag shape={look.shape} tone={look.tone}>
          {look.words}
        </Tag>
        {end ? (
          <span className="text-muted">
            after {formatDuration(end.observedAt - trial.observedAt)}, {end.recordedByName}
          </span>
        ) : null}
      </p>
      <p className="text-muted">{sentenceCase(techniqueText(trial))}</p>
      {end && end.rulesMet.length > 0 ? (
        <p className="font-semibold text-stop">Stop rules met: {end.rulesMet.map(({ words }) => words).join('; ')}</p>
      ) : null}
      {end?.reason ? <p>{sentenceCase(end.reason)}</p> : null}
    </EvidenceLine>
  )
}
