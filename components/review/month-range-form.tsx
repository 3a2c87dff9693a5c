import { Button } from '@/components/ui/button'

type MonthRangeFormProps = {
  from: string
  to: string
  /** What is wrong with a month, by field; empty when nothing is. */
  errors: { from?: string | undefined; to?: string | undefined }
}

/** Which months are shown. A plain form: it works before any script has loaded, and its answer is a page that can be kept as a bookmark. */
export function MonthRangeForm({ from, to, errors }: MonthRangeFormProps) {
  return (
    <form method="get" className="no-print flex flex-wrap items-start gap-4" aria-label="Months shown" noValidate>
      <MonthField name="from" label="First month" value={from} error={errors.from} />
      <MonthField name="to" label="Last month" value={to} error={errors.to} />
      <Button type="submit" className="mt-6">
        Show
      </Button>
    </form>
  )
}

function MonthField({ name, label, value, error }: { name: string; label: string; value: string; error: string | undefined }) {
  return (
    <div className="w-44">
      <label htmlFor={`review-${name}`} className="block text-sm text-muted">
        {label}
      </label>
      <input
        id={`review-${name}`}
        name={name}
        type="month"
        defaultValue={value}
        aria-invalid={error !== undefined}
        aria-describedby={error === undefined ? undefined : `review-${name}-error`}
        className="min-h-[44px] w-full rounded-control border border-muted bg-field px-3 text-ink aria-invalid:border-2 aria-invalid:border-stop"
      />
      {error === undefined ? null : (
        <p id={`review-${name}-error`} className="mt-1 text-sm font-semibold text-stop">
          {error}
        </p>
      )}
    </div>
  )
}
