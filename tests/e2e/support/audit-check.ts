import { execFileSync } from 'node:child_process'
import type { AuditCheck } from '@/lib/server/verify-audit'

/** Whether the audit log of a database file is whole. */
export function checkAuditLog(databaseFile: string): AuditCheck {
  const args = ['--conditions=react-server', '--import', 'tsx', 'tests/e2e/support/print-audit-check.ts', databaseFile]
  return JSON.parse(execFileSync(process.execPath, args, { encoding: 'utf8' })) as AuditCheck
}
