import { cookies } from 'next/headers'
import type { ReactNode } from 'react'
import { AppShell } from '@/components/shell/app-shell'
import { readThemeCookie } from '@/components/shell/read-theme'
import { Providers } from '@/lib/client/providers'
import { pageCtx } from '@/lib/server/session'
import { readMe } from '@/lib/services/session/read-me'

/** The frame of the administration and of a person's own account. What may be read is decided by each page's verbs. */
export default async function AdminLayout({ children }: { children: ReactNode }) {
  const ctx = await pageCtx()
  const jar = await cookies()
  return (
    <Providers>
      <AppShell
        me={readMe(ctx)}
        rememberedUnitId={jar.get('daybreath-unit')?.value ?? null}
        theme={readThemeCookie(jar.get('daybreath-theme')?.value)}
        serverNowMs={ctx.now}
      >
        {children}
      </AppShell>
    </Providers>
  )
}
