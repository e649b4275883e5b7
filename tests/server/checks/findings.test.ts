import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { Finding as FindingRow } from '../../../server/database/entities/Finding.js'
import { ScanCheck } from '../../../server/database/entities/ScanCheck.js'
import { closeChecksWorkers } from '../../../server/jobs/checksInWorker.js'
import { enqueueMissingChecks, runDueJobs } from '../../../server/jobs/runDueJobs.js'
import type { Device } from '../../../shared/contract/devices.js'
import type { Finding } from '../../../shared/contract/findings.js'
import type { Job } from '../../../shared/contract/jobs.js'
import type { ScanCheckReport, Thresholds } from '../../../shared/contract/scanChecks.js'
import type { Scan } from '../../../shared/contract/scans.js'
import { startApplication, type Application } from '../../support/application.js'
import { BOTTOM, REFLECTANCE, TOP, csvOf, laboratory } from '../scans/stack.js'

let application: Application
let lab: ReturnType<typeof laboratory>
let files = 0
beforeAll(async () => {
  application = await startApplication()
  lab = laboratory(application, (await application.addProject('Checks')).id)
})
afterAll(async () => {
  await closeChecksWorkers()
  await application?.stop()
})

const manager = () => application.dataSource.manager
const rowsOf = (scanId: string) => manager().find(FindingRow, { where: { scanId }, order: { rank: 'ASC' } })
const bench = () => application.as('experimentalist')
const reportOf = async (scanId: string): Promise<ScanCheckReport> =>
  (await application.as('collaborator').get(`${lab.base}/scans/${scanId}/checks`).expect(200)).body

async function stack(name: string): Promise<{ device: Device; top: Scan; bottom: Scan }> {
  const device = await lab.tandem(name)
  const reading = await lab.upload(csvOf({ 'EQE top': TOP, [`EQE bottom ${++files}`]: BOTTOM }), `${name}.csv`)
  const [top, bottom] = await lab.confirm(reading, device)
  return { device, top: top!, bottom: bottom! }
}

async function setConditions(scan: Scan, conditions: object): Promise<Scan> {
  const reply = await bench()
    .put(`${lab.base}/scans/${scan.id}/conditions`)
    .send({ version: scan.version, label: scan.label, conditions })
    .expect(200)
  return reply.body
}

/** A blue LED in place of an infrared one: the top cell drowns in its own light, so the bottom cell limits. */
const WRONG_LIGHT = { biasLight: [{ name: 'LED 470 nm', centreNm: 470, fwhmNm: 25, irradianceWM2: 100 }] }

describe('findings', () => {
  test('are in the reply to the confirmation of an upload, and kept with numbers and bands', async () => {
    const device = await lab.tandem('Cut off')
    const cut = csvOf({ 'EQE top': TOP, [`EQE bottom ${++files}`]: BOTTOM })
      .toString()
      .split('\n')
      .filter((line) => !(Number(line.split(',')[0]) > 1000))
      .join('\n')
    const [, bottom] = await lab.confirm(await lab.upload(Buffer.from(cut), 'cut.csv'), device)

    expect(bottom).toMatchObject({ worstFinding: 'caution', unansweredRejects: 0, origin: 'eqe-file' })
    const [row, second] = await rowsOf(bottom!.id)
    expect(second).toBeUndefined()
    expect(row).toMatchObject({ check: 'truncated-range', severity: 'caution', junctionPosition: 2, answerKind: null })
    const matching = await bench().get(`${lab.base}/devices/${device.id}/matching`).expect(200)
    expect(matching.body.findings).toMatchObject([{ id: row!.id, check: 'truncated-range', scanId: bottom!.id }])
  })

  test('a check without its inputs says what is missing, and is never among those that passed', async () => {
    const { bottom } = await stack('Nothing recorded')
    const report = await reportOf(bottom.id)
    const reasons = Object.fromEntries(report.notChecked.map(({ check, reason }) => [check, reason]))
    expect(reasons).toMatchObject({
      'bias-light-too-weak': 'no bias light recorded',
      'not-on-plateau': 'no bias series',
      'disagrees-with-jv': 'no Jsc of an illuminated J–V',
    })
    const passed = report.passed.map(({ check }) => check)
    expect(passed).toContain('truncated-range')
    expect(passed.filter((check) => check in reasons)).toEqual([])
    expect(report.passed.length + report.notChecked.length + report.findings.length).toBe(17)
  })

  test('follow the conditions: the wrong bias light appears at once, and goes with its correction', async () => {
    const { top } = await stack('Wrong light')
    const wrong = await setConditions(top, WRONG_LIGHT)
    expect(wrong).toMatchObject({ worstFinding: 'reject', unansweredRejects: 1 })
    expect(await rowsOf(top.id)).toMatchObject([{ check: 'bias-light-too-weak', severity: 'reject' }])

    const right = await setConditions(wrong, {
      biasLight: [{ name: 'LED 940 nm', centreNm: 940, fwhmNm: 50, irradianceWM2: 100 }],
    })

    expect(right).toMatchObject({ worstFinding: null, unansweredRejects: 0 })
    expect(await rowsOf(top.id)).toEqual([])
  })

  test('follow the Jsc of the J–V, the other junction’s scan and the reflectance', async () => {
    const { device, top, bottom } = await stack('Dependent')
    await setConditions(top, { jvJscMaCm2: 30 })
    const checks = async () =>
      [...(await rowsOf(top.id)), ...(await rowsOf(bottom.id))].map(({ check }) => check).sort()
    expect(await checks()).toEqual(['disagrees-with-jv'])

    await bench()
      .put(`${lab.base}/scans/${bottom.id}/decision`)
      .send({ version: bottom.version, state: 'excluded', reason: 'measured on another sample' })
      .expect(200)

    const without = await reportOf(top.id)
    expect(without.findings).toEqual([])
    expect(without.notChecked.find(({ check }) => check === 'disagrees-with-jv')?.reason).toBe('no scan of junction 2')
    const bright = csvOf({ Reflectance: { ...REFLECTANCE, values: REFLECTANCE.values.map((r) => r + 0.35) } })
    await lab.confirm(await lab.upload(bright, 'bright.csv'), device)
    expect(await checks()).toContain('sum-above-absorptance')
  })
})

describe('an answer', () => {
  const answer = (finding: Pick<Finding, 'id' | 'scanId'>, body: object, who: 'experimentalist' | 'designer') =>
    application.as(who).put(`${lab.base}/scans/${finding.scanId}/findings/${finding.id}/answer`).send(body)

  test('stays while the finding is the same, and goes when its numbers change', async () => {
    const { device, top } = await stack('Answered')
    const wrong = await setConditions(top, WRONG_LIGHT)
    const [finding] = await rowsOf(top.id)
    const reply = await answer(finding!, { kind: 'accepted', reason: 'a test of the method' }, 'experimentalist')
    expect(reply.body).toMatchObject({
      check: 'bias-light-too-weak',
      answer: { kind: 'accepted', reason: 'a test of the method', by: { id: application.people.experimentalist.id } },
    })
    const read = await bench().get(`${lab.base}/scans/${top.id}`).expect(200)
    expect(read.body.scan).toMatchObject({ worstFinding: 'reject', unansweredRejects: 0 })
    const events = await manager().findBy(AuditEvent, { subjectId: top.id, action: 'finding.answered' })
    expect(events.map(({ sentence }) => sentence)).toEqual([
      `Test experimentalist answered “Bias light too weak” on the scan ${top.label} of Answered: accepted because a test of the method.`,
    ])

    await lab.confirm(await lab.upload(csvOf({ Reflectance: REFLECTANCE }), 'another.csv'), device)
    expect(await rowsOf(top.id)).toMatchObject([{ id: finding!.id, answerReason: 'a test of the method' }])

    const more = { biasLight: [{ ...WRONG_LIGHT.biasLight[0]!, irradianceWM2: 50 }] }
    const changed = await setConditions({ ...top, version: wrong.version }, more)
    expect(changed).toMatchObject({ worstFinding: 'reject', unansweredRejects: 1 })
    expect((await rowsOf(top.id))[0]).toMatchObject({ answerKind: null, answeredById: null })
  })

  test('names the repeat, which must be another scan of the junction; and can be taken back', async () => {
    const { top, bottom, device } = await stack('Repeated')
    await setConditions(top, WRONG_LIGHT)
    const [finding] = await rowsOf(top.id)
    for (const repeatedAsScanId of [top.id, bottom.id]) {
      const refused = await answer(finding!, { kind: 'repeated', repeatedAsScanId }, 'experimentalist')
      expect(refused.body).toMatchObject({ code: 'INPUT_INVALID', errors: [{ path: ['repeatedAsScanId'] }] })
    }
    const [repeat] = await lab.confirm(await lab.upload(csvOf({ [`EQE again ${++files}`]: TOP }), 'again.csv'), device)
    const said = { kind: 'repeated', repeatedAsScanId: repeat!.id }
    expect((await answer(finding!, said, 'designer')).body).toMatchObject({ code: 'RIGHT_MISSING' })
    const reply = await answer(finding!, said, 'experimentalist').expect(200)
    expect(reply.body.answer).toMatchObject(said)

    await bench().delete(`${lab.base}/scans/${top.id}/findings/${finding!.id}/answer`).expect(200)

    expect((await rowsOf(top.id))[0]).toMatchObject({ answerKind: null, repeatedAsScanId: null, answeredAt: null })
  })
})

describe('thresholds', () => {
  const read = async (): Promise<Thresholds> => (await bench().get(`${lab.base}/thresholds`).expect(200)).body
  const valueOf = ({ checks }: Thresholds, check: string, name: string) =>
    checks.find((one) => one.check === check)?.thresholds.find((one) => one.name === name)

  test('have the stated defaults; a change checks the whole project again by a job, once for two servers', async () => {
    const { bottom } = await stack('Judged more strictly')
    expect((await rowsOf(bottom.id)).map(({ check }) => check)).toEqual([])
    const before = await read()
    expect(before.version).toBe(0)
    expect(valueOf(before, 'leakage', 'cautionShare')).toMatchObject({ value: 0.01, defaultValue: 0.01 })

    const settings = { 'coarse-step': { largestChange: 1e-9 } }
    const reply = await bench().put(`${lab.base}/thresholds`).send({ version: 0, settings }).expect(200)

    expect(reply.body.job).toMatchObject({ kind: 'recheck-scans', state: 'waiting', done: 0 })
    expect(valueOf(reply.body.thresholds, 'coarse-step', 'largestChange')).toMatchObject({ value: 1e-9 })
    await Promise.all([runDueJobs(application.database), runDueJobs(application.database)])
    const job: Job = (await bench().get(`${lab.base}/jobs/${reply.body.job.id}`).expect(200)).body
    expect(job).toMatchObject({ state: 'done', done: job.total, requestedBy: { name: 'Test experimentalist' } })
    expect(job.total).toBeGreaterThan(8)
    expect((await rowsOf(bottom.id)).map(({ check }) => check)).toEqual(['coarse-step'])

    const stale = await bench().put(`${lab.base}/thresholds`).send({ version: 0, settings: {} })
    expect(stale.body).toMatchObject({ code: 'STALE_VERSION', details: { currentVersion: 1 } })
    const back = await bench().put(`${lab.base}/thresholds`).send({ version: 1, settings: {} }).expect(200)
    await runDueJobs(application.database)
    expect(back.body.thresholds.version).toBe(2)
    expect(await rowsOf(bottom.id)).toEqual([])
  })

  test.each([
    [{ 'no-such-check': {} }, ['settings', 'no-such-check']],
    [{ leakage: { colour: 1 } }, ['settings', 'leakage', 'colour']],
    [{ leakage: { cautionShare: 0 } }, ['settings', 'leakage', 'cautionShare']],
  ])('%j is refused with the place that is wrong', async (settings, path) => {
    const { version } = await read()
    const reply = await bench().put(`${lab.base}/thresholds`).send({ version, settings })
    expect(reply.body).toMatchObject({ code: 'INPUT_INVALID', errors: [{ path }] })
    expect((await read()).version).toBe(version)
  })
})

describe('a job', () => {
  test('that was cancelled is not run', async () => {
    const job = (await bench().post(`${lab.base}/jobs`).expect(202)).body as Job
    const cancelled = await bench().delete(`${lab.base}/jobs/${job.id}`).expect(200)
    expect(cancelled.body).toMatchObject({ state: 'cancelled' })
    await runDueJobs(application.database)
    expect((await bench().get(`${lab.base}/jobs/${job.id}`).expect(200)).body).toMatchObject({ state: 'cancelled' })
  })

  test('checks scans that were there before their checks were kept', async () => {
    const { top } = await stack('From before')
    await manager().delete(ScanCheck, { scanId: top.id })
    await enqueueMissingChecks(application.database)
    await runDueJobs(application.database)
    expect(await manager().countBy(ScanCheck, { scanId: top.id })).toBe(1)
    const [latest] = (await bench().get(`${lab.base}/jobs`).expect(200)).body.items as Job[]
    expect(latest).toMatchObject({ state: 'done', requestedBy: null })
  })
})
