import type { ReactNode } from 'react'
import { Brand } from '@/components/shell/brand'
import { Providers } from '@/lib/client/providers'

/** The frame of the pages before sign-in: one column, nothing but the form. */
export default function AuthLayout({ children }: { children: ReactNode }) {
  return (
    <Providers>
      <div className="mx-auto flex min-h-dvh w-full max-w-[34rem] flex-col px-4 py-6 tablet:py-16">
        <header className="mb-8">
          <Brand />
        </header>
        <main id="main" className="flex-1">
          {children}
        </main>
        <footer className="mt-12 border-t border-line pt-4 text-sm text-muted">
          Decision support for licensed clinicians. Local protocol and orders come first. Adults only.
        </footer>
      </div>
    </Providers>
  )
}
