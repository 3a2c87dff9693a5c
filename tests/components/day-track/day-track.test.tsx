import { render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test } from 'vitest'
import { axisHours, percentAt } from '@/components/day-track/axis'
import { DayTrack } from '@/components/day-track/day-track'
import { describeTrack } from '@/components/day-track/describe-track'
import { layOutTrack } from '@/components/day-track/lay-out-track'
import type { DayTrackDto } from '@/lib/schemas/today'

const at = (time: string) => Date.parse(`2026-12-01T${time}:00Z`)
const axis = { fromMs: at('04:00'), toMs: at('20:00') }
const time = (ms: number) => new Date(ms).toISOString().slice(11, 16)
const EMPTY: DayTrackDto = { screens: [], holds: [], pairingWindow: null, trials: [], decisions: [] }
const FULL: DayTrackDto = {
  screens: [{ atMs: at('06:12'), result: 'ready' }],
  holds: [{ startMs: at('07:10'), endMs: at('08:20'), start: 'started', outcome: 'tolerated' }],
  pairingWindow: { startMs: at('07:10'), endMs: at('09:10') },
  trials: [
    { startMs: at('08:30'), endMs: at('09:00'), outcome: 'passed', observationsMs: [at('08:32'), at('08:45'), at('09:00')] },
  ],
  decisions: [{ atMs: at('09:40'), choice: 'extubate' }],
}

test('says the whole day in words, in order of time', () => {
  expect(describeTrack(FULL, at('10:00'), time)).toBe(
    'Screen ready at 06:12. Sedation hold from 07:10 to 08:20, tolerated. Breathing trial from 08:30 to 09:00, 3 observations, passed. ' +
      'Pairing window closed at 09:10. Decision at 09:40: extubate.',
  )
})

test('says what still runs and when the window closes', () => {
  const track: DayTrackDto = {
    ...FULL,
    holds: [{ startMs: at('07:10'), endMs: null, start: 'started', outcome: null }],
    trials: [{ startMs: at('08:30'), endMs: null, outcome: null, observationsMs: [at('08:32')] }],
    decisions: [],
  }
  const words = describeTrack(track, at('08:40'), time)
  expect(words).toContain('Sedation hold running since 07:10.')
  expect(words).toContain('Breathing trial running since 08:30, 1 observation.')
  expect(words).toContain('Pairing window closes at 09:10.')
})

test.each([
  ['not_needed', 'Sedation hold not needed, noted at 07:10.'],
  ['unsafe', 'Sedation hold unsafe, noted at 07:10.'],
] as const)('says that a hold was %s', (start, words) => {
  expect(
    describeTrack({ ...EMPTY, holds: [{ startMs: at('07:10'), endMs: null, start, outcome: null }] }, at('08:00'), time),
  ).toBe(words)
})

test('says so when nothing has been recorded', () => {
  expect(describeTrack(EMPTY, at('08:00'), time)).toBe('Nothing recorded yet today.')
})

test('gives the drawing its text equivalent', () => {
  render(<DayTrack track={FULL} axis={axis} nowMs={at('10:00')} timeZone="UTC" />)
  expect(screen.getByRole('img').getAttribute('aria-label')).toContain(
    'Breathing trial from 08:30 to 09:00, 3 observations, passed.',
  )
})

test('places everything on the one scale', () => {
  const layout = layOutTrack(FULL, axis, at('10:00'), time)
  expect(percentAt(axis, at('12:00'))).toBe(50)
  expect(layout.bars.map(({ kind, from, to }) => ({ kind, from, to }))).toEqual([
    { kind: 'hold', from: percentAt(axis, at('07:10')), to: percentAt(axis, at('08:20')) },
    { kind: 'trial', from: percentAt(axis, at('08:30')), to: percentAt(axis, at('09:00')) },
  ])
  expect(layout.bars[1]?.dots).toHaveLength(3)
  expect(layout.marks.map((mark) => mark.shape)).toEqual(['tick', 'tick', 'tick', 'flag'])
  expect([layout.earlier, layout.later]).toEqual([[], []])
})

test('lets what runs reach to the present', () => {
  const layout = layOutTrack(
    { ...EMPTY, trials: [{ startMs: at('08:30'), endMs: null, outcome: null, observationsMs: [] }] },
    axis,
    at('08:54'),
    time,
  )
  expect(layout.bars[0]).toMatchObject({ to: percentAt(axis, at('08:54')), isOpen: true })
})

test('folds what lies before and after the axis to its ends, with its times', () => {
  const track: DayTrackDto = {
    ...EMPTY,
    screens: [
      { atMs: at('02:30'), result: 'not_ready' },
      { atMs: at('21:15'), result: 'ready' },
    ],
    holds: [{ startMs: at('03:20'), endMs: at('04:30'), start: 'started', outcome: 'not_tolerated' }],
    trials: [{ startMs: at('19:40'), endMs: at('20:20'), outcome: 'failed', observationsMs: [at('19:50'), at('20:10')] }],
  }
  const layout = layOutTrack(track, axis, at('22:00'), time)
  expect(layout.earlier).toEqual(['02:30 screen not ready', '03:20 sedation hold began'])
  expect(layout.later).toEqual(['21:15 screen ready', '20:20 breathing trial failed'])
  expect(layout.bars.map(({ from, to }) => [Math.round(from), Math.round(to)])).toEqual([
    [0, 3],
    [98, 100],
  ])
  expect(layout.bars[1]?.dots).toHaveLength(1)
})

test('keeps a bar that lies wholly outside out of the drawing, but not out of the fold', () => {
  const layout = layOutTrack(
    { ...EMPTY, holds: [{ startMs: at('02:00'), endMs: at('03:00'), start: 'started', outcome: 'stopped' }] },
    axis,
    at('08:00'),
    time,
  )
  expect(layout.bars).toEqual([])
  expect(layout.earlier).toEqual(['02:00 sedation hold began', '03:00 sedation hold stopped for another reason'])
})

test('opens the fold on demand from the keyboard or by tap', async () => {
  render(
    <DayTrack
      track={{ ...EMPTY, screens: [{ atMs: at('02:30'), result: 'ready' }] }}
      axis={axis}
      nowMs={at('08:00')}
      timeZone="UTC"
    />,
  )
  const summary = screen.getByText('earlier, before the axis').closest('summary')
  expect(summary?.getAttribute('title')).toBe('02:30 screen ready')
  if (summary) await userEvent.click(summary)
  const details = summary?.closest('details')
  expect(details?.open).toBe(true)
  expect(details ? within(details).getByText('02:30 screen ready') : null).toBeTruthy()
})

test('has no fold where nothing is folded', () => {
  const { container } = render(<DayTrack track={FULL} axis={axis} nowMs={at('10:00')} timeZone="UTC" />)
  expect(container.querySelector('details')).toBeNull()
})

test('gives every outcome a shape of its own', () => {
  const shapes = (['passed', 'failed', 'stopped'] as const).map(
    (outcome) =>
      layOutTrack(
        { ...EMPTY, trials: [{ startMs: at('08:00'), endMs: at('08:30'), outcome, observationsMs: [] }] },
        axis,
        at('09:00'),
        time,
      ).marks[0]?.shape,
  )
  expect(new Set(shapes).size).toBe(3)
})

test('labels the hours of the unit, also on the day the clocks change', () => {
  expect(axisHours(axis, 'UTC').map(({ label }) => label)).toEqual(['04', '08', '12', '16', '20'])
  // Denver, 1 Nov 2026: 25 hours; from midnight to midnight.
  const long = { fromMs: Date.parse('2026-11-01T06:00:00Z'), toMs: Date.parse('2026-11-02T07:00:00Z') }
  expect(axisHours(long, 'America/Denver').map(({ label }) => label)).toEqual(['00', '04', '08', '12', '16', '20', '00'])
})
