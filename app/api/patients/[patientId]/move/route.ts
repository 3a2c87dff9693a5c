import { moveFormQuerySchema, moveStaySchema } from '@/lib/schemas/stays'
import { handle } from '@/lib/server/http'
import { moveStay } from '@/lib/services/stays/move'
import { readMoveForm } from '@/lib/services/stays/read-move-form'

export const GET = handle({ input: moveFormQuerySchema, run: readMoveForm })
export const POST = handle({ input: moveStaySchema, run: moveStay })
