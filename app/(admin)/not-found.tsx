import Link from 'next/link'

export default function AdminNotFound() {
  return (
    <>
      <h1 className="text-2xl font-bold">Not found</h1>
      <p className="mt-2 max-w-reading">
        There is nothing at this address for you. The administration is open to administrators only.
      </p>
      <p className="mt-4">
        <Link href="/" className="inline-flex min-h-[44px] items-center underline font-semibold">
          Go to your first page
        </Link>
      </p>
    </>
  )
}
