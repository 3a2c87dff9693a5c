/** Shown while a page is read. */
export default function UnitLoading() {
  return (
    <p role="status" className="py-10 text-muted">
      Reading the record…
    </p>
  )
}
