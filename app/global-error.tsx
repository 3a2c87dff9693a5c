'use client'

import './globals.css'

/** Stands in when even the frame of the pages fails. */
export default function GlobalError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <html lang="en-GB">
      <body className="font-sans">
        <main className="mx-auto max-w-page px-4 py-10 tablet:px-8">
          <h1 className="text-2xl font-bold">Something went wrong</h1>
          <p className="mt-2 max-w-reading">
            This page could not be shown. What was recorded before is safe. Work from paper until it is back if it is needed now.
          </p>
          {error.digest ? <p className="mt-2 text-muted">Reference {error.digest}</p> : null}
          <button
            type="button"
            className="mt-4 min-h-[44px] cursor-pointer rounded-control bg-dawn px-5 font-semibold text-paper"
            onClick={reset}
          >
            Try again
          </button>
        </main>
      </body>
    </html>
  )
}
