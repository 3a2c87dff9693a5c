import { handle } from '@/lib/server/http'
import { reviewCsvQuerySchema } from '@/lib/schemas/review'
import { exportReviewCsv } from '@/lib/services/review/export-csv'

export const GET = handle({
  input: reviewCsvQuerySchema,
  run: exportReviewCsv,
  respond: ({ fileName, text }) =>
    new Response(text, {
      headers: { 'content-type': 'text/csv; charset=utf-8', 'content-disposition': `attachment; filename="${fileName}"` },
    }),
})
