import { SOURCES } from './provenance'

/** The ten levels of the Richmond Agitation-Sedation Scale in our own words, found. Exactly 10 s of eye contact is not defined by its text. */
export const rassLevels = [
  { level: 4, name: 'combative', words: 'violent, a danger to staff' },
  { level: 3, name: 'very agitated', words: 'pulls at tubes or is aggressive' },
  { level: 2, name: 'agitated', words: 'often moves without purpose or fights the ventilator' },
  { level: 1, name: 'restless', words: 'anxious, but movements not vigorous' },
  { level: 0, name: 'alert and calm', words: '' },
  { level: -1, name: 'drowsy', words: 'eye contact to voice for more than 10 s' },
  { level: -2, name: 'light sedation', words: 'eye contact to voice for less than 10 s' },
  { level: -3, name: 'moderate sedation', words: 'moves or opens eyes to voice, no eye contact' },
  { level: -4, name: 'deep sedation', words: 'nothing to voice, responds to touch' },
  { level: -5, name: 'unrousable', words: 'nothing to voice or touch' },
] as const

/** Where the scale was published. */
export const rassSource: string = SOURCES.sessler2002
