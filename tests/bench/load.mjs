// Requests over HTTP: throughput side by side, and memory over many requests.
import autocannon from 'autocannon'
import { residentMb } from './server.mjs'

const ask = (url, cookie, options) => autocannon({ url, headers: { cookie }, connections: 10, ...options })
const median = (values) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]

/** Requests per second of each target: rounds in turn, so that a slow moment of the machine meets all alike; the median of them. */
export async function compareThroughput({ address, cookie }, paths, { rounds = 5, seconds = 4 } = {}) {
  const seen = Object.fromEntries(Object.keys(paths).map((name) => [name, []]))
  for (const path of Object.values(paths)) await ask(address + path, cookie, { duration: 2 })
  for (let round = 0; round < rounds; round += 1) {
    for (const [name, path] of Object.entries(paths)) {
      const result = await ask(address + path, cookie, { duration: seconds })
      if (result.non2xx > 0 || result.errors > 0)
        throw new Error(`${path} answered ${result.non2xx} refusals and ${result.errors} errors.`)
      seen[name].push(result.requests.average)
    }
  }
  return Object.fromEntries(Object.entries(seen).map(([name, values]) => [name, median(values)]))
}

/** Median milliseconds of single requests, one after another. */
export async function medianLatencyMs({ address, cookie }, path, count = 40) {
  const times = []
  for (let index = 0; index < count + 5; index += 1) {
    const from = performance.now()
    const response = await fetch(address + path, { headers: { cookie } })
    await response.arrayBuffer()
    if (!response.ok) throw new Error(`${path} answered ${response.status}.`)
    if (index >= 5) times.push(performance.now() - from)
  }
  return median(times)
}

/** Resident memory, in MB, at steps of 1,000 requests after a warm-up in which the heap takes its size. */
export async function memoryOver({ address, cookie, pid }, path, { warmUp = 8000, requests = 10_000 } = {}) {
  await ask(address + path, cookie, { amount: warmUp })
  const steps = [residentMb(pid)]
  for (let done = 0; done < requests; done += 1000) {
    await ask(address + path, cookie, { amount: 1000 })
    steps.push(residentMb(pid))
  }
  return steps
}
