/** Typed time to HH:MM where it can only mean one thing: "540", "0540", "5:40", "5.40" all give "05:40". Anything else stays as typed. */
export function tidyTime(typed: string): string {
  const text = typed.trim()
  const found = /^(\d{1,2})[:.\s](\d{2})$/.exec(text) ?? /^(\d{1,2})(\d{2})$/.exec(text)
  if (!found) return text
  const [, hours = '', minutes = ''] = found
  if (Number(hours) > 23 || Number(minutes) > 59) return text
  return `${hours.padStart(2, '0')}:${minutes}`
}
