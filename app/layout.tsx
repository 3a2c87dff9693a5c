import type { Metadata, Viewport } from 'next'
import { cookies, headers } from 'next/headers'
import type { ReactNode } from 'react'
import { readThemeCookie } from '@/components/shell/read-theme'
import './globals.css'

export const metadata: Metadata = {
  title: { default: 'Daybreath', template: '%s · Daybreath' },
  description: 'Each ventilated patient’s day: screen, sedation hold, breathing trial, decision.',
  robots: { index: false, follow: false },
}

export const viewport: Viewport = { width: 'device-width', initialScale: 1 }

// Sets night colours before the first paint when this device is to decide, and follows it when it changes.
const DEVICE_COLOURS = `(function(){var r=document.documentElement,m=matchMedia('(prefers-color-scheme: dark)');function s(){if((r.dataset.theme||'device')==='device')r.classList.toggle('dark',m.matches)}s();m.addEventListener('change',s)})()`

/** The document: language, colours of this device, nothing else. Reading the nonce makes every page dynamic. */
export default async function RootLayout({ children }: { children: ReactNode }) {
  const nonce = (await headers()).get('x-nonce') ?? undefined
  const theme = readThemeCookie((await cookies()).get('daybreath-theme')?.value)
  return (
    <html lang="en-GB" data-theme={theme} className={theme === 'night' ? 'dark' : undefined} suppressHydrationWarning>
      <head>
        <script nonce={nonce} suppressHydrationWarning dangerouslySetInnerHTML={{ __html: DEVICE_COLOURS }} />
      </head>
      <body className="font-sans">{children}</body>
    </html>
  )
}
