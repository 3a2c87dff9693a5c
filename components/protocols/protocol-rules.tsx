import type { ReactNode } from 'react'
import type { ProtocolVersionDto } from '@/lib/schemas/protocols'
import { formatDuration, formatMinutes } from '@/lib/shared/format'
import { MINUTE_MS } from '@/lib/shared/time'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { HOLD_SAFETY_WORDS } from '@/lib/weaning/words'

const lasting = (minutes: number) => formatDuration(minutes * MINUTE_MS)

/** Every rule of one protocol version in plain words, each limit with its source. */
export function ProtocolRules({ version }: { version: ProtocolVersionDto }) {
  const { content, described } = version
  const { screeningWindow, hold, trial, decision, watch } = content
  return (
    <div className="flex flex-col gap-8">
      <Section title="Daily screen">
        <p>
          Screening window <Figure>{formatMinutes(screeningWindow.opensMin)}</Figure> to{' '}
          <Figure>{formatMinutes(screeningWindow.closesMin)}</Figure>. All of these must be met for “ready”; what is not assessed
          is not met.
        </p>
        <RuleList
          rules={described.criteria.map(({ criterion, label, limit, source }) => ({
            id: criterion,
            words: `${sentenceCase(label)}: ${limit}`,
            source,
          }))}
        />
      </Section>
      <Section title="Sedation hold">
        <p>Not started when any of these is present: {hold.safetyItems.map((item) => HOLD_SAFETY_WORDS[item]).join(', ')}.</p>
        <p>
          Due <Figure>{lasting(hold.startWithinMin)}</Figure> after a ready screen. Observed every{' '}
          <Figure>{lasting(hold.observeEveryMin)}</Figure>. Tolerated when the patient opens the eyes to voice, or after{' '}
          <Figure>{lasting(hold.toleratedAfterMin)}</Figure> without any of these:
        </p>
        <RuleList rules={described.failRules} />
        <p>
          On restart after a hold that was not tolerated: <Figure>{hold.restartFraction}</Figure> of the earlier rate.
        </p>
      </Section>
      <Section title="Breathing trial">
        <p>
          Usually <Figure>{lasting(trial.defaultDurationMin)}</Figure>, from <Figure>{lasting(trial.shortestMin)}</Figure> to{' '}
          <Figure>{lasting(trial.longestMin)}</Figure>. Due <Figure>{lasting(trial.startWithinMin)}</Figure> after the hold, or
          when the pairing window closes if that is later; the window is <Figure>{lasting(content.pairingWindowMin)}</Figure> from
          the start of the hold. Observed at minute <Figure>{trial.observationMinutes.join(', ')}</Figure>. A trial stopped for
          another reason is due again after <Figure>{lasting(trial.retryWithinMin)}</Figure>.
        </p>
        <p>Reasons to stop:</p>
        <RuleList rules={described.stopRules} />
      </Section>
      <Section title="Decision and watch">
        <p>
          A passed trial gets an answer within <Figure>{lasting(decision.answerWithinMin)}</Figure>; a signed extubation is
          carried out within <Figure>{lasting(decision.extubateWithinMin)}</Figure>. After extubation the patient is looked at
          after <Figure>{watch.hours.join(', ')}</Figure> h.
        </p>
      </Section>
    </div>
  )
}

function Section({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="flex max-w-reading flex-col gap-2">
      <h3 className="text-lg font-bold">{title}</h3>
      {children}
    </section>
  )
}

function Figure({ children }: { children: ReactNode }) {
  return <span className="figure font-semibold">{children}</span>
}

function RuleList({ rules }: { rules: { id: string; words: string; source: string }[] }) {
  return (
    <ul className="border-t border-line">
      {rules.map(({ id, words, source }) => (
        <li key={id} className="border-b border-line py-2">
          <p className="font-semibold">{sentenceCase(words)}</p>
          <p className="text-sm text-muted">{source}</p>
        </li>
      ))}
    </ul>
  )
}
