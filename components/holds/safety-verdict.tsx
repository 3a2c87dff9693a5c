import { Tag } from '@/components/ui/tag'
import type { HoldSafetyVerdict } from '@/lib/weaning/hold/judge-safety'
import { HOLD_SAFETY_WORDS } from '@/lib/weaning/words'

/** What the safety answers come to so far. Spoken when it changes. */
export function SafetyVerdict({ verdict }: { verdict: HoldSafetyVerdict }) {
  const { result, present, notAssessed } = verdict
  return (
    <p role="status" className="border-t-2 border-ink pt-3 text-lg">
      {result === 'unsafe' ? (
        <Tag shape="cross" tone="stop">
          Unsafe: {present.map((item) => HOLD_SAFETY_WORDS[item]).join(', ')}
        </Tag>
      ) : null}
      {result === 'safe' ? (
        <Tag shape="tick" tone="calm">
          None present
        </Tag>
      ) : null}
      {result === 'incomplete' ? (
        <Tag shape="ring" tone="wait">
          {notAssessed.length} not assessed
        </Tag>
      ) : null}
    </p>
  )
}
