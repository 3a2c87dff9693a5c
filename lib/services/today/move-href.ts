import type { MoveStep, NextMove } from '@/lib/weaning/day-record'

/** Which form of an episode each step opens. */
export const STEP_PATHS: Record<MoveStep, string> = {
  screen: 'screen',
  complete_screen: 'screen',
  hold: 'hold',
  observe_hold: 'hold',
  end_hold: 'hold',
  start_trial: 'trial',
  observe_trial: 'trial',
  end_trial: 'trial',
  decide: 'decision',
  decide_again: 'decision',
  extubate: 'end',
}

/** The page on which the owed step is done; null when nothing is owed. */
export function moveHref(episodeId: string, move: NextMove): string | null {
  return move.kind === 'move' ? `/episodes/${episodeId}/${STEP_PATHS[move.step]}` : null
}
