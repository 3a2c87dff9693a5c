import type { ReactNode } from 'react'
import { Tag } from '@/components/ui/tag'

/** One piece of evidence: its name, and what stands in the record; said plainly when nothing does. */
export function EvidenceLine({
  label,
  isMissing = false,
  children,
}: {
  label: string
  isMissing?: boolean
  children?: ReactNode
}) {
  return (
    <div className="grid gap-x-6 gap-y-1 border-t border-line py-3 tablet:grid-cols-[11rem_minmax(0,1fr)]">
      <dt className="font-semibold">{label}</dt>
      <dd className="min-w-0">
        {isMissing ? (
          <Tag shape="ring" tone="wait">
            not recorded
          </Tag>
        ) : (
          children
        )}
      </dd>
    </div>
  )
}
