import { z } from 'zod'
import { handle } from '@/lib/server/http'

// Part of the bench's build only: the same constant behind the session check.
export const GET = handle({ input: z.object({}), run: () => ({ is: 'constant' }) })
