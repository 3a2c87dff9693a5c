// Part of the bench's build only: the least that a route handler can do.
export function GET(): Response {
  return Response.json({ is: 'constant' }, { headers: { 'cache-control': 'no-store' } })
}
