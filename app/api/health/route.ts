import { answerHealth } from '@/lib/server/health'

export const dynamic = 'force-dynamic'
export const GET = answerHealth
