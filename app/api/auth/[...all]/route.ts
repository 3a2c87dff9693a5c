import { answerAuthRequest } from '@/lib/server/auth-route'

export const GET = answerAuthRequest
export const POST = answerAuthRequest
