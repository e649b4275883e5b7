import autocannon from 'autocannon'
import { fork, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import { fileURLToPath } from 'node:url'
import { openBrowserSession } from './browserSession.js'
import type { Matching } from '../shared/contract/matching.js'
import { makeCurve } from '../shared/physics/curve.js'
import { shortCircuitCurrentDensity } from '../shared/physics/currents.js'
import { referenceSpectrum } from '../shared/physics/spectrum.js'
import type { BenchServers } from './devicePage.server.js'
import type { BenchRow } from './rows.js'

const READERS = 20
const WARM_UP_SECONDS = 3
const SECONDS = 6

/** What the device page reads, under twenty readers at once, beside a bare handler that reads the same rows. */
export default {
  name: 'Device page, 95th percentile',
  async run(): Promise<BenchRow[]> {
    const child = fork(fileURLToPath(new URL('./devicePage.server.ts', import.meta.url)))
    try {
      return await measure(await serversOf(child))
    } finally {
      await end(child)
    }
  },
}

async function serversOf(child: ChildProcess): Promise<BenchServers> {
  const endedEarly = once(child, 'exit').then(() =>
    Promise.reject(new Error('The servers to be measured did not start.')),
  )
  const [servers] = (await Promise.race([once(child, 'message'), endedEarly])) as [BenchServers]
  endedEarly.catch(() => null)
  return servers
}

async function measure({ oursUrl, peerUrl, projectId, deviceId, email, password }: BenchServers): Promise<BenchRow[]> {
  const cookie = await openBrowserSession(oursUrl, email, password)
  const headers = { cookie }
  const device = `/api/projects/${projectId}/devices/${deviceId}`
  const bare = `/devices/${deviceId}`
  const rows: BenchRow[] = []
  const peerMs = await p95Ms(peerUrl, bare, {})
  for (const [name, path] of [
    ['matching of a device', `${device}/matching`],
    ['curves of a device', `${device}/curves`],
  ] as const)
    rows.push({
      name: `${name}, ${READERS} readers at once`,
      oursMs: await p95Ms(oursUrl, path, headers),
      peerMs,
      peer: 'bare Express + mysql2, same rows',
      largestDifference: await differenceOfCurrents(`${oursUrl}${device}/matching`, `${peerUrl}${bare}`, headers),
    })
  return rows
}

/** 95th percentile of the time to a reply, ms, after a warm-up. */
async function p95Ms(url: string, path: string, headers: Record<string, string>): Promise<number> {
  const options = { url: `${url}${path}`, connections: READERS, headers }
  await autocannon({ ...options, duration: WARM_UP_SECONDS })
  const timesMs: number[] = []
  let failed = 0
  await new Promise<void>((resolve, reject) => {
    const running = autocannon({ ...options, duration: SECONDS }, (error) =>
      error ? reject(error as Error) : resolve(),
    )
    running.on('response', (_client, status, _bytes, timeMs) => {
      if (status === 200) timesMs.push(timeMs)
      else failed++
    })
  })
  if (failed > 0 || timesMs.length < 100) throw new Error(`${path}: ${failed} replies failed of ${timesMs.length}.`)
  timesMs.sort((a, b) => a - b)
  return timesMs[Math.floor(0.95 * timesMs.length)]!
}

/** Currents that the application gives against those of the engine on the rows that the bare handler sent, mA/cm². */
async function differenceOfCurrents(oursUrl: string, peerUrl: string, headers: Record<string, string>) {
  const matching = (await (await fetch(oursUrl, { headers })).json()) as Matching
  const { scans } = (await (await fetch(peerUrl)).json()) as {
    scans: { id: string; wavelengthNm: number[]; values: number[] }[]
  }
  const spectrum = referenceSpectrum('AM1.5G')
  return Math.max(
    ...matching.junctions.map(({ scanId, jscMaCm2 }) => {
      const scan = scans.find((one) => one.id === scanId)!
      return Math.abs(jscMaCm2! - shortCircuitCurrentDensity(makeCurve(scan.wavelengthNm, scan.values), spectrum))
    }),
  )
}

async function end(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null) return
  const ended = once(child, 'exit')
  if (child.connected) child.disconnect()
  await ended
}
