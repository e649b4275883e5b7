import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { SourceFile } from '../../../server/database/entities/SourceFile.js'
import { Problem } from '../../../shared/contract/errors.js'
import { startApplication, type Application } from '../../support/application.js'
import { BAD_FILES } from './badFiles.js'

let application: Application
let projectId: string
beforeAll(async () => {
  application = await startApplication({ UPLOAD_MAX_BYTES: '8000000', UPLOAD_MAX_FILES: '3' })
  projectId = (await application.addProject('Bad files')).id
})
afterAll(() => application?.stop())

const path = () => `/api/projects/${projectId}/source-files`
const rows = async () => ({
  files: await application.dataSource.manager.countBy(SourceFile, { projectId }),
  events: await application.dataSource.manager.countBy(AuditEvent, { projectId }),
})
const GOOD = Buffer.from('Wavelength (nm),EQE\n400,0.5\n500,0.6\n600,0.7\n700,0.2\n')

describe('a bad file gets its sentence, and nothing is half-saved:', () => {
  test.each(BAD_FILES.map((file) => [file.title, file] as const))('%s', async (_, { name, bytes, sentence }) => {
    const before = await rows()
    const reply = await application.as('experimentalist').post(path()).attach('files', bytes, name)

    if (reply.status === 201) {
      // There is a table, so a corrected mapping may still help: the file is kept and says what is wrong.
      const [reading] = reply.body.items
      expect(reading.problem.reason).toMatch(sentence)
      expect(reading.tables.length).toBeGreaterThan(0)
      expect(reading.series).toEqual([])
      expect(await rows()).toEqual({ files: before.files + 1, events: before.events + 1 })
    } else {
      expect(reply.body).toMatchObject({ status: 422, code: 'FILE_UNREADABLE', details: { fileName: name } })
      expect(Problem.parse(reply.body).detail).toMatch(sentence)
      expect(await rows()).toEqual(before)
    }
    await application.as('experimentalist').get(path()).expect(200)
  })

  test('with a good file beside it: neither is kept', async () => {
    const before = await rows()
    const reply = await application
      .as('experimentalist')
      .post(path())
      .attach('files', GOOD, 'good.csv')
      .attach('files', Buffer.from('no table here'), 'prose.txt')
    expect(reply.body).toMatchObject({ status: 422, details: { fileName: 'prose.txt' } })
    expect(await rows()).toEqual(before)
  })
})

describe('what is no upload at all', () => {
  test('a file above the limit', async () => {
    const before = await rows()
    const reply = await application
      .as('experimentalist')
      .post(path())
      .attach('files', Buffer.alloc(8_000_001, '1'), 'large.csv')
    expect(reply.body).toMatchObject({ status: 413, code: 'BODY_TOO_LARGE', details: { limitBytes: 8_000_000 } })
    expect(reply.body.detail).toMatch(/8 MB/)
    expect(await rows()).toEqual(before)
  })

  test('more files than are taken at once', async () => {
    const request = application.as('experimentalist').post(path())
    for (const name of ['a.csv', 'b.csv', 'c.csv', 'd.csv']) request.attach('files', GOOD, name)
    expect((await request).body).toMatchObject({
      status: 400,
      errors: [{ path: ['files'], message: 'At most 3 files can be sent at once.' }],
    })
  })

  test('a part with another name', async () => {
    const reply = await application.as('experimentalist').post(path()).attach('scan', GOOD, 'scan.csv')
    expect(reply.body).toMatchObject({ status: 400, errors: [{ path: ['files'] }] })
  })

  test('JSON in place of files', async () => {
    const reply = await application.as('experimentalist').post(path()).send({ files: [] })
    expect(reply.body).toMatchObject({ status: 400, errors: [{ path: ['files'] }] })
  })

  test('multipart that breaks off', async () => {
    const reply = await application
      .as('experimentalist')
      .post(path())
      .set('Content-Type', 'multipart/form-data; boundary=edge')
      .send('--edge\r\nContent-Disposition: form-data; name="files"; filename="a.csv"\r\n\r\n400,0.5')
    expect(reply.body).toMatchObject({ status: 400, errors: [{ path: ['files'] }] })
  })

  test('a picture that says so', async () => {
    const reply = await application
      .as('experimentalist')
      .post(path())
      .attach('files', Buffer.from([0x89, 0x50, 0x4e, 0x47]), { filename: 'curve.png', contentType: 'image/png' })
    expect(reply.body).toMatchObject({ status: 422, details: { fileName: 'curve.png', value: 'image/png' } })
  })

  test('a file of somebody who may not upload, however large, is not even read', async () => {
    const reply = await application
      .as('designer')
      .post(path())
      .attach('files', Buffer.alloc(9_000_000, '1'), 'large.csv')
    expect(reply.body).toMatchObject({ status: 403, details: { right: 'edit-scans' } })
  })
})
