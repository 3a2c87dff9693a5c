'use client'

import dynamic from 'next/dynamic'
import type { MeasureChartData } from './measure-series'

// The chart library is large and drawn only here, so it comes after the numbers.
const MeasureChart = dynamic(() => import('./measure-chart').then((module) => module.MeasureChart), {
  ssr: false,
  loading: () => <p className="text-muted">Drawing the chart…</p>,
})

/** Holds the chart's place while it loads, so that nothing jumps. */
export function LazyMeasureChart({ data }: { data: MeasureChartData }) {
  return (
    <div className="h-[260px]">
      <MeasureChart data={data} />
    </div>
  )
}
