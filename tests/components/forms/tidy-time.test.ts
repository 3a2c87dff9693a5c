import { expect, test } from 'vitest'
import { tidyTime } from '@/components/forms/tidy-time'

test.each([
  ['540', '05:40'],
  ['0540', '05:40'],
  ['5:40', '05:40'],
  ['5.40', '05:40'],
  ['05 40', '05:40'],
  ['2359', '23:59'],
  ['0000', '00:00'],
])('reads %j as %s', (typed, time) => expect(tidyTime(typed)).toBe(time))

test.each(['2400', '1260', '5', '54', '', '5:4', 'noon', '12345', '25:00'])('leaves %j as typed', (typed) =>
  expect(tidyTime(typed)).toBe(typed),
)
