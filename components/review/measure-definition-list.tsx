import { MEASURE_DEFINITIONS, type ReviewMeasure } from '@/lib/weaning/course/measure-definitions'

/** Numerator, denominator, what is left out, and what to bear in mind. */
export function MeasureDefinitionList({ measure }: { measure: ReviewMeasure }) {
  const { numerator, denominator, exclusions, notes } = MEASURE_DEFINITIONS[measure]
  return (
    <dl className="max-w-reading pb-3 [&_dd]:mb-2 [&_dt]:font-semibold">
      <dt>{denominator === null ? 'What is counted' : 'Numerator'}</dt>
      <dd>{numerator}</dd>
      {denominator === null ? null : (
        <>
          <dt>Denominator</dt>
          <dd>{denominator}</dd>
        </>
      )}
      {exclusions.length > 0 ? (
        <>
          <dt>Not counted</dt>
          {exclusions.map((text) => (
            <dd key={text}>{text}</dd>
          ))}
        </>
      ) : null}
      <dt>To bear in mind</dt>
      {notes.map((text) => (
        <dd key={text}>{text}</dd>
      ))}
    </dl>
  )
}
