import { Mark, type MarkShape } from '@/components/ui/mark'
import { TONE_TEXT, type Tone } from '@/components/ui/tag'
import { clockTime } from '@/lib/client/wall-clock'
import { cn } from '@/lib/shared/cn'
import type { JudgedRuleDto } from '@/lib/schemas/observation'
import { sentenceCase } from '@/lib/weaning/sentence-case'

const LOOK: Record<JudgedRuleDto['state'], { shape: MarkShape; tone: Tone }> = {
  met: { shape: 'cross', tone: 'stop' },
  near: { shape: 'late', tone: 'dawn' },
  clear: { shape: 'tick', tone: 'calm' },
  unknown: { shape: 'ring', tone: 'wait' },
}

type RuleStatesProps = { rules: readonly JudgedRuleDto[]; title: string; timeZone: string; nowMs: number }

/** Each stop rule with its state in words. What is met or near stands open and is spoken when it changes; the rest is one tap away. */
export function RuleStates({ rules, title, timeZone, nowMs }: RuleStatesProps) {
  const loud = [...rules.filter(({ state }) => state === 'met'), ...rules.filter(({ state }) => state === 'near')]
  const quiet = [...rules.filter(({ state }) => state === 'unknown'), ...rules.filter(({ state }) => state === 'clear')]
  const unknownCount = quiet.filter(({ state }) => state === 'unknown').length
  return (
    <section aria-label={title} className="flex flex-col gap-2">
      <h2 className="font-semibold">{title}</h2>
      <div aria-live="polite">
        {loud.length === 0 ? (
          <p className="text-muted">
            {quiet.length === unknownCount ? 'None can be judged yet.' : 'None met, none near by what was observed.'}
          </p>
        ) : (
          <ul className="flex flex-col gap-2">
            {loud.map((rule) => (
              <RuleLine key={rule.id} rule={rule} timeZone={timeZone} nowMs={nowMs} />
            ))}
          </ul>
        )}
      </div>
      {quiet.length > 0 ? (
        <details>
          <summary className="min-h-[44px] cursor-pointer py-2.5 text-muted underline decoration-line decoration-2 underline-offset-4">
            {quietSummary(quiet.length - unknownCount, unknownCount)}
          </summary>
          <ul className="flex flex-col gap-2 pt-1">
            {quiet.map((rule) => (
              <RuleLine key={rule.id} rule={rule} timeZone={timeZone} nowMs={nowMs} />
            ))}
          </ul>
        </details>
      ) : null}
    </section>
  )
}

function quietSummary(clear: number, unknown: number): string {
  const parts = [clear > 0 ? `${clear} within limits` : null, unknown > 0 ? `${unknown} not judged` : null]
  return `${parts.filter(Boolean).join(', ')}: show all`
}

function RuleLine({ rule, timeZone, nowMs }: { rule: JudgedRuleDto; timeZone: string; nowMs: number }) {
  const look = LOOK[rule.state]
  return (
    <li className="flex items-baseline gap-2.5">
      <Mark shape={look.shape} className={cn('translate-y-[0.08em]', TONE_TEXT[look.tone])} />
      <span className="min-w-0">
        <span className={cn(rule.state === 'met' && 'font-semibold text-stop')}>{sentenceCase(rule.words)}</span>
        <span className={cn('block text-sm', rule.state === 'near' ? 'font-semibold text-dawn' : 'text-muted')}>
          {describeState(rule, (ms) => clockTime(ms, timeZone, nowMs), nowMs)}
        </span>
        <span className="block text-sm text-muted">{rule.source}</span>
      </span>
    </li>
  )
}

/** "limit exceeded since 09:41, long enough at 09:46: look again". Pure; `time` writes a moment as the unit's clock shows it. */
export function describeState(rule: JudgedRuleDto, time: (ms: number) => string, nowMs: number): string {
  switch (rule.state) {
    case 'met':
      return rule.sinceMs === null ? 'met' : `met, beyond the limit from ${time(rule.sinceMs)}`
    case 'near': {
      if (rule.sinceMs === null || rule.reachedAtMs === null) return 'part of it is present, not yet enough'
      const isReached = nowMs >= rule.reachedAtMs
      return `limit exceeded since ${time(rule.sinceMs)}, long enough at ${time(rule.reachedAtMs)}: look again ${isReached ? 'now' : 'then'}`
    }
    case 'clear':
      return 'within the limit at the last look'
    case 'unknown':
      return 'not judged: no value, or no baseline to compare with'
  }
}
