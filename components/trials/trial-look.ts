import type { MarkShape } from '@/components/ui/mark'
import type { Tone } from '@/components/ui/tag'
import type { TrialOutcome } from '@/lib/weaning/vocabulary'
import { TRIAL_OUTCOME_WORDS } from '@/lib/weaning/words'

/** Mark and words of a trial by its outcome; null while it runs. */
export function trialLook(outcome: TrialOutcome | null): { shape: MarkShape; tone: Tone; words: string } {
  if (outcome === null) return { shape: 'bar', tone: 'dawn', words: 'Trial running' }
  const words = `Trial ${TRIAL_OUTCOME_WORDS[outcome]}`
  if (outcome === 'passed') return { shape: 'tick', tone: 'calm', words }
  return outcome === 'failed' ? { shape: 'cross', tone: 'stop', words } : { shape: 'square', tone: 'wait', words }
}
