/** Shown while a page of the administration is read. */
export default function AdminLoading() {
  return (
    <p role="status" className="py-10 text-muted">
      One moment…
    </p>
  )
}
