import type { TodayRowDto } from '@/lib/schemas/today'
import type { ClinicalRole } from '@/lib/weaning/vocabulary'

export const GROUPS = ['yours', 'others', 'unclear', 'later', 'none', 'after'] as const
export type Group = (typeof GROUPS)[number]
export const GROUP_WORDS: Record<Group, string> = {
  yours: 'Yours',
  others: 'Waiting on others',
  unclear: 'No move can be worked out',
  later: 'Not due yet',
  none: 'Nothing due until tomorrow',
  after: 'After extubation',
}

/** Whose move a row is, seen by somebody who holds these roles in the unit. */
export function groupOf(row: TodayRowDto, roles: readonly ClinicalRole[]): Group {
  if (row.endedAtMs !== null) return 'after'
  if (row.move.kind === 'move') return roles.includes(row.move.role) ? 'yours' : 'others'
  const { code } = row.move.reason
  if (code === 'age_unknown' || code === 'not_adult') return 'unclear'
  return code === 'before_window' ? 'later' : 'none'
}

/** The rows in groups, the reader's own first; within these two by when they are due, elsewhere by bed. Empty groups are left out. */
export function groupRows(rows: readonly TodayRowDto[], roles: readonly ClinicalRole[]): { group: Group; rows: TodayRowDto[] }[] {
  const found = new Map<Group, TodayRowDto[]>()
  for (const row of rows) {
    const group = groupOf(row, roles)
    found.set(group, [...(found.get(group) ?? []), row])
  }
  return GROUPS.flatMap((group) => {
    const members = found.get(group)
    if (!members) return []
    return [{ group, rows: group === 'yours' || group === 'others' ? members.toSorted(byDue) : members }]
  })
}

function byDue(a: TodayRowDto, b: TodayRowDto): number {
  return dueMs(a) - dueMs(b) || a.bedOrder - b.bedOrder
}

function dueMs(row: TodayRowDto): number {
  return row.move.kind === 'move' ? row.move.dueMs : Number.MAX_SAFE_INTEGER
}
