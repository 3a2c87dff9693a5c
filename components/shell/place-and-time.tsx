'use client'

import { useEffect, useState } from 'react'
import { Mark } from '@/components/ui/mark'
import { useLive } from '@/lib/client/live'
import { shortDay, wallClock } from '@/lib/client/wall-clock'
import { cn } from '@/lib/shared/cn'
import { useShellUnit, type ShellUnit } from './shell-unit'

type PlaceAndTimeProps = { units: readonly ShellUnit[]; fallbackUnitId: string | null; hospitalName: string; serverNowMs: number }

/** Unit, hospital, the unit's own clock, and whether what stands on the page is live. */
export function PlaceAndTime({ units, fallbackUnitId, hospitalName, serverNowMs }: PlaceAndTimeProps) {
  const unit = useShellUnit(units, fallbackUnitId)
  const clock = useClock(serverNowMs)
  return (
    <div className="flex min-w-0 flex-wrap gap-x-2 text-sm desk:flex-col desk:items-end">
      <span className="font-semibold">{unit && units.length < 2 ? `${unit.name} · ${hospitalName}` : hospitalName}</span>
      {unit ? (
        <span className="text-muted">
          {shortDay(wallClock(clock.serverMs, unit.timeZone).day)},{' '}
          <span className="figure">{wallClock(clock.serverMs, unit.timeZone).time}</span>
          <LiveState timeZone={unit.timeZone} clock={clock} />
        </span>
      ) : null}
    </div>
  )
}

type Clock = { serverMs: number; deviceMs: number }

function LiveState({ timeZone, clock }: { timeZone: string; clock: Clock }) {
  const live = useLive()
  if (live === null) return null
  const { isSilent } = live
  const heard = wallClock(live.heardAtMs + clock.serverMs - clock.deviceMs, timeZone).time
  return (
    <span className={cn(isSilent && 'font-semibold text-stop')}>
      {' · '}
      {isSilent ? (
        <>
          <Mark shape="late" /> last heard <span className="figure">{heard}</span>
        </>
      ) : (
        'live'
      )}
    </span>
  )
}

/** The server's clock carried on by this device's timer: a device whose clock is wrong still shows the unit's time. */
function useClock(serverNowMs: number): Clock {
  const [clock, setClock] = useState<Clock>({ serverMs: serverNowMs, deviceMs: serverNowMs })
  useEffect(() => {
    const startedAt = performance.now()
    const tick = () => setClock({ serverMs: serverNowMs + performance.now() - startedAt, deviceMs: Date.now() })
    tick()
    const timer = setInterval(tick, 2_000)
    return () => clearInterval(timer)
  }, [serverNowMs])
  return clock
}
