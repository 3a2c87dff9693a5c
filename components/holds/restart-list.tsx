import type { RestartDto } from '@/lib/schemas/holds'

/** At most three decimals, none of them made up: 7.5 stays 7.5, 2.6666 is shown as 2.667. */
export function rateNumber(rate: number): string {
  return String(Number(rate.toFixed(3)))
}

/** What the protocol's fraction of each rate before comes to. Information for the prescriber. */
export function RestartList({ restarts, fraction }: { restarts: readonly RestartDto[]; fraction: number | null }) {
  if (restarts.length === 0) return <p className="text-muted">No sedative infusion was held.</p>
  return (
    <div>
      <ul>
        {restarts.map((restart) => (
          <li key={`${restart.drug}${restart.unit}`} className="flex flex-wrap items-baseline gap-x-3 border-b border-line py-2">
            <span className="min-w-0 flex-1">{restart.drug}</span>
            <span className="text-muted">{rateNumber(restart.rateBefore)} before</span>
            <span className="figure text-xl font-semibold">{rateNumber(restart.rate)}</span>
            <span className="text-muted">{restart.unit}</span>
          </li>
        ))}
      </ul>
      <p className="mt-1 text-sm text-muted">
        {fraction === null
          ? 'Computed from the rate before'
          : `${fraction === 0.5 ? 'Half' : `${rateNumber(fraction * 100)} %`} of the rate before, computed`}
        . The prescriber decides whether and at what rate it is restarted.
      </p>
    </div>
  )
}
