import { cn } from '@/lib/shared/cn'

/** Shapes of our own on a 16 × 16 field. A state is always told by shape and word; colour only helps. */
export const MARK_SHAPES = [
  'tick',
  'cross',
  'ring',
  'flag',
  'flagOpen',
  'square',
  'diamond',
  'late',
  'pause',
  'info',
  'dot',
  'hatch',
  'bar',
  'dash',
] as const
export type MarkShape = (typeof MARK_SHAPES)[number]

const STROKE = {
  fill: 'none',
  stroke: 'currentColor',
  strokeWidth: 2.4,
  strokeLinecap: 'round',
  strokeLinejoin: 'round',
} as const

/** The bare drawing, for use inside another SVG; it fills a field of 16 × 16. */
export function MarkPath({ shape }: { shape: MarkShape }) {
  switch (shape) {
    case 'tick':
      return <path d="M2.5 8.8 6 12.8 13.5 3.5" {...STROKE} />
    case 'cross':
      return <path d="M3.4 3.4 12.6 12.6M12.6 3.4 3.4 12.6" {...STROKE} />
    case 'ring':
      return <circle cx="8" cy="8" r="5.2" {...STROKE} />
    case 'flag':
      return <path d="M3.5 15.2V1.4h9.6L10.4 5.2l2.7 3.8H5.4v6.2Z" fill="currentColor" />
    case 'flagOpen':
      return <path d="M4.4 15V2.4h8L10.2 5.6l2.2 3.2h-8" {...STROKE} strokeWidth={1.8} />
    case 'square':
      return <rect x="3" y="3" width="10" height="10" rx="1" {...STROKE} />
    case 'diamond':
      return <path d="M8 1.8 14.2 8 8 14.2 1.8 8Z" {...STROKE} />
    case 'late':
      return <path d="M8 1.6 15 14H1ZM8 6v3.6M8 11.6v.4" {...STROKE} strokeWidth={1.8} />
    case 'pause':
      return <path d="M5.4 3.2v9.6M10.6 3.2v9.6" {...STROKE} strokeWidth={2.8} />
    case 'info':
      return <path d="M8 7.2v5.4M8 3.4v.4" {...STROKE} strokeWidth={2.8} />
    case 'dot':
      return <circle cx="8" cy="8" r="5" fill="currentColor" />
    case 'hatch':
      return <path d="M1.5 4h13v8h-13ZM3 12l4-8M7 12l4-8M11 12l3-6" {...STROKE} strokeWidth={1.3} />
    case 'bar':
      return <rect x="1" y="4" width="14" height="8" rx="1" fill="currentColor" />
    case 'dash':
      return <path d="M3 8h10" {...STROKE} />
  }
}

/** A mark beside its word. Hidden from screen readers, because the word says the same. */
export function Mark({ shape, className }: { shape: MarkShape; className?: string }) {
  return (
    <svg
      viewBox="0 0 16 16"
      aria-hidden="true"
      focusable="false"
      className={cn('inline-block size-[0.95em] shrink-0 align-[-0.08em]', className)}
    >
      <MarkPath shape={shape} />
    </svg>
  )
}
