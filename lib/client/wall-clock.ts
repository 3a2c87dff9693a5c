const PARTS: Intl.DateTimeFormatOptions = {
  year: 'numeric',
  month: '2-digit',
  day: '2-digit',
  hour: '2-digit',
  minute: '2-digit',
  hourCycle: 'h23',
}
const formats = new Map<string, Intl.DateTimeFormat>()

function partsFormat(timeZone: string): Intl.DateTimeFormat {
  let format = formats.get(timeZone)
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', { ...PARTS, timeZone })
    formats.set(timeZone, format)
  }
  return format
}

/** What a clock in the unit shows at a moment: day yyyy-mm-dd and time HH:MM. */
export function wallClock(ms: number, timeZone: string): { day: string; time: string } {
  const parts: Partial<Record<Intl.DateTimeFormatPartTypes, string>> = {}
  for (const { type, value } of partsFormat(timeZone).formatToParts(ms)) parts[type] = value
  return { day: `${parts.year}-${parts.month}-${parts.day}`, time: `${parts.hour}:${parts.minute}` }
}

const WEEKDAYS = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat']
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']

/** "Tue 1 Dec" for a calendar day yyyy-mm-dd. */
export function shortDay(day: string): string {
  const [year = 0, month = 1, date = 1] = day.split('-').map(Number)
  const weekday = new Date(Date.UTC(year, month - 1, date)).getUTCDay()
  return `${WEEKDAYS[weekday]} ${date} ${MONTHS[month - 1]}`
}

/** The calendar day some days earlier or later, yyyy-mm-dd. */
export function dayShifted(day: string, by: number): string {
  const [year = 0, month = 1, date = 1] = day.split('-').map(Number)
  return new Date(Date.UTC(year, month - 1, date + by)).toISOString().slice(0, 10)
}

/** "09:40", or "30 Nov 09:40" when it is not the day of `nowMs`. */
export function clockTime(ms: number, timeZone: string, nowMs: number): string {
  const at = wallClock(ms, timeZone)
  if (at.day === wallClock(nowMs, timeZone).day) return at.time
  return `${shortDay(at.day).slice(4)} ${at.time}`
}
