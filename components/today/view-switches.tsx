'use client'

import { cn } from '@/lib/shared/cn'

export type Order = 'mine' | 'bed'
const ORDERS: readonly { value: Order; label: string }[] = [
  { value: 'mine', label: 'Mine first' },
  { value: 'bed', label: 'By bed' },
]

type ViewSwitchesProps = {
  order: Order
  onOrder: (order: Order) => void
  isNameHidden: boolean
  onNameHidden: (isHidden: boolean) => void
}

/** How the list is looked at: order, and names shown or hidden. */
export function ViewSwitches({ order, onOrder, isNameHidden, onNameHidden }: ViewSwitchesProps) {
  return (
    <div className="no-print flex flex-wrap items-center gap-x-5 gap-y-2">
      <label className="flex min-h-[44px] cursor-pointer items-center gap-2.5">
        <input
          type="checkbox"
          checked={isNameHidden}
          aria-keyshortcuts="h"
          className="size-5 accent-current"
          onChange={(event) => onNameHidden(event.target.checked)}
        />
        Hide names
      </label>
      <fieldset>
        <legend className="sr-only">Order of the list</legend>
        <span className="inline-flex overflow-hidden rounded-control border border-muted/80">
          {ORDERS.map(({ value, label }) => (
            <label
              key={value}
              className={cn(
                'focus-within-ring relative inline-flex min-h-[44px] cursor-pointer items-center px-4',
                value === order ? 'bg-ink font-semibold text-paper' : 'bg-field',
              )}
            >
              <input
                type="radio"
                name="order"
                checked={value === order}
                onChange={() => onOrder(value)}
                className="absolute inset-0 size-full cursor-pointer appearance-none opacity-0"
              />
              {label}
            </label>
          ))}
        </span>
      </fieldset>
    </div>
  )
}
