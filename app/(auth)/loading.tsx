/** Shown while a page before sign-in is read. */
export default function AuthLoading() {
  return (
    <p role="status" className="text-muted">
      One moment…
    </p>
  )
}
