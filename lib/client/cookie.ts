/** Settings of this device that both sides read. Never anything about a patient. */
export type SettingCookie = 'daybreath-theme' | 'daybreath-unit' | 'daybreath-names' | 'daybreath-order' | 'daybreath-keys'

const ONE_YEAR_S = 31_536_000
const listeners = new Set<() => void>()

/** Keeps a setting for this session of the browser, or for a year when it is lasting. */
export function writeCookie(name: SettingCookie, value: string, { isLasting = false } = {}): void {
  const secure = window.location.protocol === 'https:' ? '; Secure' : ''
  const age = isLasting ? `; Max-Age=${ONE_YEAR_S}` : ''
  document.cookie = `${name}=${encodeURIComponent(value)}; Path=/; SameSite=Lax${age}${secure}`
  for (const listener of listeners) listener()
}

/** A setting's value; null when it was never made. */
export function readCookie(name: SettingCookie): string | null {
  const pair = document.cookie.split('; ').find((each) => each.startsWith(`${name}=`))
  return pair === undefined ? null : decodeURIComponent(pair.slice(name.length + 1))
}

/** Calls back when a setting was made on this page. */
export function subscribeCookies(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}
