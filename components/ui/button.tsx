import Link from 'next/link'
import type { ButtonHTMLAttributes, ComponentProps } from 'react'
import { cn } from '@/lib/shared/cn'

export type ButtonVariant = 'primary' | 'secondary' | 'danger' | 'quiet'

const BASE =
  'inline-flex min-h-[44px] min-w-[44px] cursor-pointer items-center justify-center gap-2 rounded-control py-2 text-center font-semibold no-underline'

const VARIANTS: Record<ButtonVariant, string> = {
  primary: 'px-5 bg-dawn text-paper hover:bg-dawn/90',
  secondary: 'px-5 border border-ink bg-transparent text-ink hover:bg-ink/5',
  danger: 'px-5 border-2 border-stop bg-transparent text-stop hover:bg-stop/10',
  quiet: 'px-3 text-ink underline decoration-line decoration-2 underline-offset-4 hover:decoration-ink',
}

/** The look of a button, for an element that must be something else. */
export function buttonClass(variant: ButtonVariant, className?: string): string {
  return cn(BASE, VARIANTS[variant], className)
}

type ButtonProps = ButtonHTMLAttributes<HTMLButtonElement> & { variant?: ButtonVariant }

/** A button of at least 44 × 44 px. Type "button" unless said otherwise, so that it never sends a form by accident. */
export function Button({ variant = 'secondary', type = 'button', className, ...rest }: ButtonProps) {
  return <button type={type} className={buttonClass(variant, className)} {...rest} />
}

/** A link that looks like a button: it goes to a place rather than doing something. */
export function ButtonLink({
  variant = 'secondary',
  className,
  ...rest
}: ComponentProps<typeof Link> & { variant?: ButtonVariant }) {
  return <Link className={buttonClass(variant, className)} {...rest} />
}
