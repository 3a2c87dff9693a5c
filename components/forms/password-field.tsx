'use client'

import { useState } from 'react'
import type { FieldValues } from 'react-hook-form'
import { Button } from '@/components/ui/button'
import { cn } from '@/lib/shared/cn'
import { CONTROL_LOOK, FieldFrame, type FieldProps } from './field-frame'
import { describedBy, shownText, useField } from './use-field'

type PasswordFieldProps<Values extends FieldValues, Context, Output> = FieldProps<Values, Context, Output> & {
  autoComplete: 'current-password' | 'new-password'
}

/** A password, shown only while asked for. */
export function PasswordField<Values extends FieldValues, Context, Output>(props: PasswordFieldProps<Values, Context, Output>) {
  const { control, name, label, hint, isLabelHidden, className, autoComplete } = props
  const { ids, path, value, error, register, change, blur } = useField({ control, name })
  const [isShown, setShown] = useState(false)
  return (
    <FieldFrame
      ids={ids}
      label={label}
      hint={hint}
      error={error}
      isLabelHidden={isLabelHidden}
      className={className}
      beside={
        <Button
          variant="quiet"
          aria-pressed={isShown}
          aria-label={isShown ? `Hide ${label.toLowerCase()}` : `Show ${label.toLowerCase()}`}
          onClick={() => setShown(!isShown)}
        >
          {isShown ? 'Hide' : 'Show'}
        </Button>
      }
    >
      <input
        id={ids.control}
        type={isShown ? 'text' : 'password'}
        name={path}
        ref={register}
        value={shownText(value)}
        autoComplete={autoComplete}
        autoCapitalize="off"
        spellCheck={false}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(ids, hint, error)}
        style={{ width: '24ch' }}
        className={cn(CONTROL_LOOK, 'max-w-full')}
        onChange={change}
        onBlur={blur}
      />
    </FieldFrame>
  )
}
