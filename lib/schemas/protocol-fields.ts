import { z } from 'zod'

/** A number of a protocol within what it can sensibly be; the refusal names the range. */
export function protocolRange(label: string, unit: string, from: number, to: number, isWhole: boolean) {
  const range = `${label} is between ${from} and ${to}${unit === '' ? '' : ` ${unit}`}.`
  const number = z.number({ error: range }).min(from, range).max(to, range)
  return isWhole ? number.int(`${label} is a whole number.`) : number
}

/** Whole minutes within a range. */
export function minutes(label: string, from: number, to: number) {
  return protocolRange(label, 'min', from, to, true)
}

/** One line of text that must say something. */
export function textLine(whenMissing: string, longest: number) {
  return z.string({ error: whenMissing }).trim().min(2, whenMissing).max(longest, `Keep it under ${longest} characters.`)
}
