import type { RecordedDto } from '@/lib/schemas/patient-page'

const PATHS: Record<RecordedDto['kind'], string> = {
  settings: 'settings',
  gas: 'gases',
  airway: 'airway',
  screen: 'screen',
  hold: 'hold',
  hold_observation: 'hold',
  hold_end: 'hold',
  trial: 'trial',
  trial_observation: 'trial',
  trial_end: 'trial',
  decision: 'decision',
}

/** Where an entry is corrected. */
export function amendHref(episodeId: string, kind: RecordedDto['kind'], versionId: string): string {
  return `/episodes/${episodeId}/${PATHS[kind]}?amend=${encodeURIComponent(versionId)}`
}
