import type { listProtocolVersions } from '@/db/queries/protocols'
import type { DescribedProtocol, ProtocolVersionDto } from '@/lib/schemas/protocols'
import type { ProtocolContent, StopRule } from '@/lib/weaning/protocol'
import { describeLimit } from '@/lib/weaning/screen/describe-limit'
import { describeRule } from '@/lib/weaning/stop/describe-rule'
import { CRITERION_UNITS, CRITERION_WORDS } from '@/lib/weaning/words'

type NamedVersion = ReturnType<typeof listProtocolVersions>[number]

/** The rules of a protocol in plain words. */
export function describeProtocol(content: ProtocolContent): DescribedProtocol {
  const describe = (rule: StopRule) => ({ id: rule.id, words: describeRule(rule), source: rule.source })
  return {
    criteria: content.screen.map((rule) => ({
      criterion: rule.criterion,
      label: CRITERION_WORDS[rule.criterion],
      limit: [describeLimit(rule), CRITERION_UNITS[rule.criterion]].filter((part) => part !== '').join(' '),
      source: rule.source,
    })),
    failRules: content.hold.failRules.map(describe),
    stopRules: content.trial.stopRules.map(describe),
  }
}

export function toProtocolVersionDto({ row, draftedByName, approvedByName }: NamedVersion): ProtocolVersionDto {
  return {
    id: row.id,
    number: row.number,
    isDefault: row.isDefault,
    content: row.content,
    described: describeProtocol(row.content),
    note: row.note,
    draftedAt: row.draftedAt,
    draftedByName,
    approvedAt: row.approvedAt,
    approvedByName,
    startsAt: row.startsAt,
    version: row.version,
  }
}
