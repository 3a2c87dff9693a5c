import Link from 'next/link'
import { EntryMeta } from '@/components/episodes/entry-meta'
import { Tag } from '@/components/ui/tag'
import { clockTime } from '@/lib/client/wall-clock'
import type { DecisionDto } from '@/lib/schemas/decisions'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { DECISION_WORDS } from '@/lib/weaning/words'

/** The first characters of a signature's hash: enough to compare by eye with a print. */
export const HASH_SHOWN = 12

type Props = { decision: DecisionDto; timeZone: string; nowMs: number; amendHref: string | null }

/** A signed decision: what was signed, by whom, when, and the beginning of the hash over decision and evidence. */
export function SignedDecision({ decision, timeZone, nowMs, amendHref }: Props) {
  return (
    <article className="border-t border-line py-4">
      <h3 className="flex flex-wrap items-baseline gap-x-3">
        <span className="figure text-lg font-semibold">{clockTime(decision.recordedAt, timeZone, nowMs)}</span>
        <Tag shape="flag" tone="ink" className="text-lg">
          {sentenceCase(DECISION_WORDS[decision.choice])}
        </Tag>
      </h3>
      <p className="max-w-reading">{decision.statement}</p>
      <p className="text-sm text-muted">
        Signature <span className="figure">{decision.contentHash.slice(0, HASH_SHOWN)}</span> over the decision and the evidence
        of that moment
      </p>
      <EntryMeta entry={decision} timeZone={timeZone} nowMs={nowMs} />
      {amendHref ? (
        <Link href={amendHref} className="inline-flex min-h-[44px] items-center">
          Correct this decision
        </Link>
      ) : null}
    </article>
  )
}
