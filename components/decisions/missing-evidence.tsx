import { Notice } from '@/components/ui/notice'
import type { EvidenceItem } from '@/lib/schemas/decisions'

const WORDS: Record<EvidenceItem, string> = {
  screen: 'screen',
  hold: 'sedation hold',
  trial: 'breathing trial',
  rsbi: 'RSBI',
  settings: 'settings',
  gas: 'blood gas',
  cough: 'cough',
  secretions: 'secretions',
}

/** What nobody has recorded, in one line. Nothing is drawn when all is there. */
export function MissingEvidence({ missing }: { missing: readonly EvidenceItem[] }) {
  if (missing.length === 0) return null
  return (
    <Notice tone="wait" title={`Not recorded: ${missing.map((item) => WORDS[item]).join(', ')}`} className="my-6">
      What is not recorded counts neither for nor against. It can be recorded first, or the decision signed without it.
    </Notice>
  )
}
