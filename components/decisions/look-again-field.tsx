'use client'

import { Controller, type Control } from 'react-hook-form'
import { FieldError } from '@/components/forms/field-frame'
import { tidyTime } from '@/components/forms/tidy-time'
import { dayShifted, shortDay } from '@/lib/client/wall-clock'
import type { DecisionInput } from './use-decision-form'

const LOOK =
  'min-h-[44px] max-w-full rounded-control border border-muted/80 bg-field px-3.5 text-ink aria-invalid:border-2 aria-invalid:border-stop'
const DAYS_AHEAD = 7

/** When to look again: a day of the coming week and a time of the unit's clock. */
export function LookAgainField({ control, today }: { control: Control<DecisionInput>; today: string }) {
  return (
    <fieldset className="flex flex-col gap-1.5">
      <legend className="mb-1.5 font-semibold">Look again at</legend>
      <Controller
        control={control}
        name="lookAgain"
        render={({ field, formState }) => {
          const errors = formState.errors.lookAgain
          const message = errors?.day?.message ?? errors?.time?.message ?? errors?.fold?.message ?? errors?.message
          const value = field.value ?? { day: today, time: '' }
          const invalid = message ? (true as const) : undefined
          const asksFold = errors?.fold !== undefined || value.fold !== undefined
          return (
            <>
              <div className="flex flex-wrap gap-2">
                <select
                  aria-label="Day to look again"
                  name="lookAgain.day"
                  className={LOOK}
                  value={value.day}
                  aria-invalid={errors?.day ? true : undefined}
                  onChange={(event) => field.onChange({ day: event.target.value, time: value.time })}
                >
                  {Array.from({ length: DAYS_AHEAD + 1 }, (_, ahead) => dayShifted(today, ahead)).map((day, ahead) => (
                    <option key={day} value={day}>
                      {ahead === 0 ? `today, ${shortDay(day)}` : ahead === 1 ? `tomorrow, ${shortDay(day)}` : shortDay(day)}
                    </option>
                  ))}
                </select>
                <input
                  ref={field.ref}
                  name="lookAgain.time"
                  aria-label="Time to look again, 24-hour clock"
                  aria-invalid={invalid}
                  aria-describedby={message ? 'look-again-error' : undefined}
                  inputMode="numeric"
                  autoComplete="off"
                  placeholder="HH:MM"
                  maxLength={5}
                  value={value.time}
                  className={`figure box-content w-[6.5ch] text-xl font-semibold placeholder:text-base placeholder:font-normal placeholder:text-muted ${LOOK}`}
                  onChange={(event) => field.onChange({ day: value.day, time: event.target.value })}
                  onBlur={() => {
                    field.onChange({ ...value, time: tidyTime(value.time) })
                    field.onBlur()
                  }}
                />
              </div>
              {asksFold ? (
                <select
                  aria-label="Which of the two"
                  name="lookAgain.fold"
                  className={LOOK}
                  value={value.fold ?? ''}
                  onChange={(event) =>
                    field.onChange({
                      day: value.day,
                      time: value.time,
                      ...(event.target.value === '' ? {} : { fold: event.target.value }),
                    })
                  }
                >
                  <option value="">Choose which {value.time}</option>
                  <option value="first">the first, before the clocks go back</option>
                  <option value="second">the second, after the clocks go back</option>
                </select>
              ) : null}
              <FieldError id="look-again-error" message={message} />
            </>
          )
        }}
      />
    </fieldset>
  )
}
