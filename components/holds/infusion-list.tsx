import type { InfusionDto } from '@/lib/schemas/holds'

const rateText = (rate: number, unit: string) => `${String(rate)} ${unit}`

/** What ran before the hold: what is held, and what goes on for pain. `isPainOnly` leaves out what is held, where it already stands. */
export function InfusionList({ infusions, isPainOnly = false }: { infusions: readonly InfusionDto[]; isPainOnly?: boolean }) {
  const held = infusions.filter(({ purpose }) => purpose === 'sedation')
  const left = infusions.filter(({ purpose }) => purpose === 'pain')
  return (
    <div className="flex flex-col gap-4">
      {isPainOnly ? null : <Rates title="Held, with the rate before" infusions={held} empty="none" />}
      <Rates title="Left running for pain" infusions={left} empty="none" />
    </div>
  )
}

function Rates({ title, infusions, empty }: { title: string; infusions: readonly InfusionDto[]; empty: string }) {
  return (
    <section>
      <h2 className="font-semibold">{title}</h2>
      {infusions.length === 0 ? (
        <p className="text-muted">{empty}</p>
      ) : (
        <ul>
          {infusions.map((infusion) => (
            <li
              key={`${infusion.drug}${infusion.rate}${infusion.unit}`}
              className="flex items-baseline gap-3 border-b border-line py-1.5"
            >
              <span className="min-w-0 flex-1">{infusion.drug}</span>
              <span className="figure text-lg font-semibold">{rateText(infusion.rate, infusion.unit)}</span>
            </li>
          ))}
        </ul>
      )}
    </section>
  )
}
