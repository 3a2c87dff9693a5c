'use client'

import { useFormState, type Control, type FieldValues } from 'react-hook-form'
import { Notice } from '@/components/ui/notice'
import { focusFirstInvalid, type Submit } from './use-submit'

type FormErrorSummaryProps<Values extends FieldValues, Context, Output> = {
  control: Control<Values, Context, Output>
  submit: Pick<Submit, 'failure'>
}

/** What stands in the way of recording: the server's words, and every field's message as a link to it. Spoken at once. */
export function FormErrorSummary<Values extends FieldValues, Context, Output>({
  control,
  submit,
}: FormErrorSummaryProps<Values, Context, Output>) {
  const { errors, submitCount } = useFormState({ control })
  const messages = submitCount > 0 ? listMessages(errors) : []
  const { failure } = submit
  return (
    <div role="alert">
      {failure !== null || messages.length > 0 ? (
        <Notice tone="stop" title={failure ? failure.message : 'Not recorded yet'}>
          {failure?.code === 'UNAUTHENTICATED' ? (
            <p>
              What you typed is still here.{' '}
              <a href="/sign-in" target="_blank" rel="noreferrer">
                Sign in in a new tab
              </a>
              , then send again.
            </p>
          ) : null}
          {failure?.code === 'INTERNAL' ? <p>What you typed is still here.</p> : null}
          <ul>
            {messages.map(({ name, message }) => (
              <li key={name}>
                <a
                  href={`#${name}`}
                  className="inline-block min-h-[28px] py-1"
                  onClick={(event) => {
                    event.preventDefault()
                    focusNamed(event.currentTarget, name)
                  }}
                >
                  {message}
                </a>
              </li>
            ))}
          </ul>
        </Notice>
      ) : null}
    </div>
  )
}

/** All messages of a tree of errors, with the dotted name of the field each belongs to. */
export function listMessages(errors: object, path = ''): { name: string; message: string }[] {
  if ('message' in errors && typeof errors.message === 'string' && errors.message !== '')
    return [{ name: path, message: errors.message }]
  return Object.entries(errors).flatMap(([key, value]: [string, unknown]) =>
    typeof value === 'object' && value !== null && !(value instanceof Element) && key !== 'ref'
      ? listMessages(value, path === '' ? key : `${path}.${key}`)
      : [],
  )
}

function focusNamed(link: HTMLElement, name: string): void {
  const form = link.closest('form')
  if (!form) return
  const field = form.querySelector<HTMLElement>(`[name="${CSS.escape(name)}"], [name$="-${CSS.escape(name)}"]`)
  if (field) field.focus()
  else focusFirstInvalid(form)
}
