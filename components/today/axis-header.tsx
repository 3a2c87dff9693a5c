import { axisHours, percentAt, type Axis } from '@/components/day-track/axis'
import { TRACK_GUTTER } from '@/components/day-track/day-track'
import { cn } from '@/lib/shared/cn'
import { ROW_GRID } from './today-row'

/** Names of the columns and the hours of the axis. Every row says its own in words, so screen readers skip this. */
export function AxisHeader({ axis, timeZone }: { axis: Axis; timeZone: string }) {
  return (
    <div aria-hidden="true" className={cn(ROW_GRID, 'items-end pt-4 text-sm text-muted')}>
      <span className="hidden pl-[15px] tablet:inline">Bed</span>
      <span className="hidden tablet:inline">Patient · ventilator day · settings</span>
      <span className="order-4 hidden tablet:order-3 tablet:inline desk:order-4">Next move</span>
      <div
        className="order-3 col-span-2 tablet:order-4 tablet:col-span-3 desk:order-3 desk:col-span-1"
        style={{ paddingInline: TRACK_GUTTER }}
      >
        <div className="relative h-5">
          {axisHours(axis, timeZone).map(({ ms, label }) => (
            <span key={ms} className="figure absolute -translate-x-1/2" style={{ left: `${percentAt(axis, ms)}%` }}>
              {label}
            </span>
          ))}
        </div>
      </div>
    </div>
  )
}
