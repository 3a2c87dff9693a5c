// A program of its own, since the check is a server module: prints as JSON whether the audit log of a database file is whole.
// Use: node --conditions=react-server --import tsx tests/e2e/support/print-audit-check.ts <database file>
import { openDatabase } from '@/db/client'
import { verifyAuditLog } from '@/lib/server/verify-audit'

const db = openDatabase(process.argv[2] ?? '')
console.log(JSON.stringify(verifyAuditLog(db)))
db.$client.close()
