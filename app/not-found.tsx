import Link from 'next/link'
import { Brand } from '@/components/shell/brand'

export default function NotFound() {
  return (
    <div className="mx-auto flex min-h-dvh max-w-page flex-col px-4 tablet:px-8">
      <header>
        <Brand />
      </header>
      <main className="py-10">
        <h1 className="text-2xl font-bold">Not found</h1>
        <p className="mt-2 max-w-reading">
          There is nothing at this address for you. It may have been moved, or it may belong to another unit than yours.
        </p>
        <p className="mt-4">
          <Link href="/" className="inline-flex min-h-[44px] items-center font-semibold">
            Go to your unit
          </Link>
        </p>
      </main>
    </div>
  )
}
