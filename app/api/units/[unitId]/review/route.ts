import { handle } from '@/lib/server/http'
import { reviewQuerySchema } from '@/lib/schemas/review'
import { readReview } from '@/lib/services/review/read'

export const GET = handle({ input: reviewQuerySchema, run: readReview })
