/** Stands in a table where nothing was observed: a dash for the eye, the words for a screen reader. */
export function NotObserved() {
  return (
    <span className="text-muted">
      <span aria-hidden="true">–</span>
      <span className="sr-only">not observed</span>
    </span>
  )
}
