import type { Theme } from './theme-switch'

/** The colours chosen on this device, from its cookie; as the device has it when nothing readable was chosen. */
export function readThemeCookie(value: string | undefined): Theme {
  return value === 'day' || value === 'night' ? value : 'device'
}
