import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'

const css = readFileSync('app/globals.css', 'utf8')

/** Colour tokens of a rule of globals.css, as red, green, blue. */
function tokensOf(selector: string): Record<string, [number, number, number]> {
  const block = css.slice(css.indexOf(`${selector} {`)).split('}')[0] ?? ''
  const found: Record<string, [number, number, number]> = {}
  for (const [, name = '', r, g, b] of block.matchAll(/--(\w+): (\d+) (\d+) (\d+);/g))
    found[name] = [Number(r), Number(g), Number(b)]
  return found
}

/** Relative luminance and contrast ratio as WCAG 2.2 defines them (from memory). */
function luminance(colour: [number, number, number]): number {
  const [r = 0, g = 0, b = 0] = colour.map((part) =>
    part / 255 <= 0.04045 ? part / 255 / 12.92 : ((part / 255 + 0.055) / 1.055) ** 2.4,
  )
  return 0.2126 * r + 0.7152 * g + 0.0722 * b
}
function contrast(a: [number, number, number], b: [number, number, number]): number {
  const [dark = 0, light = 0] = [luminance(a), luminance(b)].toSorted((one, other) => one - other)
  return (light + 0.05) / (dark + 0.05)
}
const mix = (over: [number, number, number], under: [number, number, number], share: number) =>
  over.map((part, index) => part * share + (under[index] ?? 0) * (1 - share)) as [number, number, number]

describe.each([':root', '.dark'])('colours of %s', (selector) => {
  const tokens = tokensOf(selector)
  const of = (name: string): [number, number, number] => tokens[name] ?? [NaN, NaN, NaN]

  test.each(['paper', 'field'])('give values at least 7:1 on %s', (ground) => {
    expect(contrast(of('ink'), of(ground))).toBeGreaterThanOrEqual(7)
  })

  test.each(
    ['muted', 'dawn', 'calm', 'wait', 'stop'].flatMap((name) => ['paper', 'field'].map((ground) => [name, ground] as const)),
  )('give %s at least 4.5:1 on %s', (name, ground) => expect(contrast(of(name), of(ground))).toBeGreaterThanOrEqual(4.5))

  test('let the edge of a field be seen, at least 3:1', () => {
    expect(contrast(mix(of('muted'), of('paper'), 0.8), of('paper'))).toBeGreaterThanOrEqual(3)
    expect(contrast(mix(of('muted'), of('field'), 0.8), of('field'))).toBeGreaterThanOrEqual(3)
  })

  test('let marks be seen on the pairing window, at least 3:1', () => {
    for (const name of ['calm', 'wait', 'stop', 'ink']) expect(contrast(of(name), of('band'))).toBeGreaterThanOrEqual(3)
  })
})
