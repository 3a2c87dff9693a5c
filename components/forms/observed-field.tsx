'use client'

import { useState } from 'react'
import { useFormState, type Control, type FieldPath, type FieldValues } from 'react-hook-form'
import { Button } from '@/components/ui/button'
import { dayShifted, shortDay, wallClock } from '@/lib/client/wall-clock'
import { cn } from '@/lib/shared/cn'
import { CONTROL_LOOK, FieldError } from './field-frame'
import { tidyTime } from './tidy-time'
import { useField } from './use-field'

type Observed = { day?: string; time?: string; fold?: 'first' | 'second' }

type ObservedFieldProps<Values extends FieldValues, Context, Output> = {
  control: Control<Values, Context, Output>
  /** Where { day, time, fold? } lives in the form, as in lib/schemas/observed.ts. */
  name: FieldPath<Values>
  timeZone: string
  /** The server's present moment, from which "today" and "Now" are taken. */
  nowMs: number
  label?: string
  /** How many days back the list goes; an earlier day is typed. */
  daysBack?: number
  onTyped?: () => void
}

/** When it was observed: day and wall-clock time of the unit. In the doubled hour of autumn it asks which of the two. */
export function ObservedField<Values extends FieldValues, Context, Output>(props: ObservedFieldProps<Values, Context, Output>) {
  const { control, name, timeZone, nowMs, label = 'Observed at', daysBack = 3, onTyped } = props
  const { ids, value, register, change, blur } = useField({ control, name })
  const problems = observedProblems(useFormState({ control, name }).errors, name)
  const observed: Observed = typeof value === 'object' && value !== null ? value : {}
  const [typedTime, setTypedTime] = useState(observed.time ?? '')
  const shownTime = tidyTime(typedTime) === (observed.time ?? '') ? typedTime : (observed.time ?? '')
  const now = wallClock(nowMs, timeZone)
  const set = (part: Observed) => {
    const next: Observed = { ...observed, ...part }
    if (!('fold' in part)) delete next.fold
    change(next)
    onTyped?.()
  }
  const timeProblem = problems.time ?? problems.whole
  const asksFold = problems.fold !== undefined || observed.fold !== undefined

  return (
    <fieldset className="flex min-w-0 flex-col gap-1.5">
      <legend className="mb-1.5 font-semibold">{label}</legend>
      <div className="flex flex-wrap items-center gap-2">
        <DayChoice
          name={`${name}.day`}
          day={observed.day ?? ''}
          today={now.day}
          daysBack={daysBack}
          problem={problems.day}
          errorId={ids.error}
          onDay={(day) => set({ day })}
        />
        <input
          ref={register}
          name={`${name}.time`}
          aria-label="Time, 24-hour clock"
          aria-invalid={timeProblem ? true : undefined}
          aria-describedby={timeProblem ? ids.error : undefined}
          value={shownTime}
          inputMode="numeric"
          autoComplete="off"
          placeholder="HH:MM"
          maxLength={5}
          className={cn(
            CONTROL_LOOK,
            'figure w-[6.5ch] box-content text-xl font-semibold placeholder:text-muted placeholder:font-normal placeholder:text-base',
          )}
          onChange={(event) => {
            setTypedTime(event.target.value)
            set({ time: tidyTime(event.target.value) })
          }}
          onBlur={() => {
            setTypedTime(tidyTime(typedTime))
            blur()
          }}
        />
        <Button
          variant="quiet"
          onClick={() => {
            setTypedTime(now.time)
            set(now)
          }}
        >
          Now
        </Button>
      </div>
      {asksFold ? (
        <FoldChoice
          name={`${name}.fold`}
          fold={observed.fold}
          time={observed.time ?? ''}
          problem={problems.fold}
          onFold={(fold) => set({ fold })}
        />
      ) : null}
      <FieldError id={ids.error} message={problems.day ?? timeProblem ?? problems.fold} />
    </fieldset>
  )
}

type DayChoiceProps = {
  name: string
  day: string
  today: string
  daysBack: number
  problem: string | undefined
  errorId: string
  onDay: (day: string) => void
}

function DayChoice({ name, day, today, daysBack, problem, errorId, onDay }: DayChoiceProps) {
  const recent = Array.from({ length: daysBack + 1 }, (_, back) => dayShifted(today, -back))
  const [isOther, setOther] = useState(day !== '' && !recent.includes(day))
  const wiring = { 'aria-invalid': problem ? (true as const) : undefined, 'aria-describedby': problem ? errorId : undefined }
  return (
    <>
      <select
        name={isOther ? undefined : name}
        aria-label="Day"
        {...wiring}
        value={isOther ? 'other' : day}
        className={cn(CONTROL_LOOK, 'max-w-full pr-8')}
        onChange={(event) => {
          setOther(event.target.value === 'other')
          if (event.target.value !== 'other') onDay(event.target.value)
        }}
      >
        {day === '' ? <option value="">Choose the day</option> : null}
        {recent.map((each, back) => (
          <option key={each} value={each}>
            {back === 0 ? `today, ${shortDay(each)}` : back === 1 ? `yesterday, ${shortDay(each)}` : shortDay(each)}
          </option>
        ))}
        <option value="other">another day</option>
      </select>
      {isOther ? (
        <input
          type="date"
          name={name}
          aria-label="Another day"
          {...wiring}
          value={day}
          max={today}
          className={cn(CONTROL_LOOK, 'figure')}
          onChange={(event) => onDay(event.target.value)}
        />
      ) : null}
    </>
  )
}

type FoldChoiceProps = {
  name: string
  fold: Observed['fold']
  time: string
  problem: string | undefined
  onFold: (fold: 'first' | 'second') => void
}

function FoldChoice({ name, fold, time, problem, onFold }: FoldChoiceProps) {
  const words = {
    first: `the first ${time}, before the clocks went back`,
    second: `the second ${time}, after the clocks went back`,
  }
  return (
    <div role="radiogroup" aria-label={`Which ${time}`} aria-invalid={problem ? true : undefined} className="flex flex-col">
      {(['first', 'second'] as const).map((each) => (
        <label key={each} className="flex min-h-[44px] cursor-pointer items-center gap-3">
          <input
            type="radio"
            name={name}
            checked={fold === each}
            onChange={() => onFold(each)}
            className="size-5 accent-current"
          />
          {words[each]}
        </label>
      ))}
    </div>
  )
}

/** The messages at the whole field and at its parts, out of the form's tree of errors. */
function observedProblems(errors: object, name: string): { whole?: string; day?: string; time?: string; fold?: string } {
  let at: unknown = errors
  for (const step of name.split('.'))
    at = typeof at === 'object' && at !== null ? (at as Record<string, unknown>)[step] : undefined
  const message = (value: unknown): string | undefined => {
    const found: unknown = typeof value === 'object' && value !== null ? (value as Record<string, unknown>).message : undefined
    return typeof found === 'string' ? found : undefined
  }
  const parts = typeof at === 'object' && at !== null ? (at as Record<string, unknown>) : {}
  return { whole: message(at), day: message(parts.day), time: message(parts.time), fold: message(parts.fold) }
}
