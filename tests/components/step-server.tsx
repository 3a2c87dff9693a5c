import { render } from '@testing-library/react'
import type { ReactElement } from 'react'
import { vi } from 'vitest'
import { Providers } from '@/lib/client/providers'

export type Sent = { path: string; body: Record<string, unknown> }
type Answer = () => Response

/**
 * Stands in for the network, not for our code: reads answer with what `live` gives at that moment, writes are kept in `sent` and answered from
 * `answers`, else with an id.
 */
export function serve(live: () => unknown): { sent: Sent[]; answers: Answer[] } {
  const sent: Sent[] = []
  const answers: Answer[] = []
  vi.spyOn(globalThis, 'fetch').mockImplementation((path, init) => {
    if (init?.method !== 'POST') return Promise.resolve(Response.json(live()))
    sent.push({ path: String(path), body: JSON.parse(String(init.body)) as Record<string, unknown> })
    const answer = answers.shift() ?? (() => Response.json({ id: 'new' }))
    return Promise.resolve(answer())
  })
  return { sent, answers }
}

export const refusal = (status: number, dto: object) => () => Response.json(dto, { status })

export function show(page: ReactElement) {
  const view = render(<Providers>{page}</Providers>)
  return { ...view, again: (next: ReactElement) => view.rerender(<Providers>{next}</Providers>) }
}
