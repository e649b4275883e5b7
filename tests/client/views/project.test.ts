import { beforeEach, describe, expect, test } from 'vitest'
import { createDevice, deleteDevice, readDevice, restoreDevice } from '../../../shared/contract/devices.js'
import { ApiError } from '../../../shared/contract/errors.js'
import { listDevices, readDeviceCurves, readMatching } from '../../../shared/contract/matching.js'
import { createProject, listProjects, readProject } from '../../../shared/contract/projects.js'
import { listScans, listSourceFiles } from '../../../shared/contract/scans.js'
import { listSpectra } from '../../../shared/contract/spectra.js'
import { FakeServer } from '../fakeServer.js'
import { am15g, device, idOf, page, project, scan, session, summary } from '../samples.js'
import { arrival, buttonOf, openScreen, press, settled, shownText, submit, type } from '../screen.js'

const address = `/projects/${idOf(100)}`
let server: FakeServer
beforeEach(() => {
  server = new FakeServer(session())
    .on(readProject, () => project())
    .on(listSpectra, () => ({ items: [am15g] }))
    .on(listDevices, () =>
      page([
        summary({ id: idOf(201), name: 'T-01' }, [18.2, 20.4], { worstFinding: 'caution' }),
        summary({ id: idOf(202), name: 'T-02' }, [20.0, 18.0]),
      ]),
    )
})
const cellsOf = (screen: { findAll: (selector: string) => { text: () => string }[] }) =>
  screen.findAll('.devices tbody tr').map((row) => row.text().replace(/\s+/g, ' '))

describe('the table of devices', () => {
  test('shows current, limiting junction, mismatch and findings of each device', async () => {
    const { screen } = await openScreen(address)
    const [first, second] = cellsOf(screen)
    expect(first).toContain('18.20 / 20.40')
    expect(first).toContain('1 top')
    expect(first).toContain('12.1')
    expect(first).toContain('caution')
    expect(second).toContain('2 bottom')
    expect(second).toContain('no findings')
    expect(screen.find('.devices svg').attributes('aria-label')).toBe('top 18.20 mA/cm², bottom 20.40 mA/cm²')
    expect(document.title).toBe('Perovskite on silicon · Tierlight')
  })

  test('sorts by a heading, there and back, and keeps the order in the address', async () => {
    const { screen, router } = await openScreen(address)
    await press('Mismatch (%)')
    expect(cellsOf(screen)[0]).toContain('T-02')
    expect(screen.find('th[aria-sort="ascending"]').text()).toContain('Mismatch')
    await press('Mismatch (%)')
    expect(router.currentRoute.value.query['sort']).toBe('-mismatch')
    expect(cellsOf(screen)[0]).toContain('T-01')
  })

  test('a link with a search shows what it found', async () => {
    const { screen } = await openScreen(`${address}?search=t-02`)
    expect(cellsOf(screen)).toHaveLength(1)
    expect(shownText()).toContain('1 of 2')
  })

  test('asks for the currents under the spectrum and scaling of the address', async () => {
    await openScreen(`${address}?spectrum=AM0&scale=1000`)
    expect(server.requestsOf(listDevices)[0]?.query).toEqual({ spectrum: 'AM0', scaleToWM2: '1000', limit: '200' })
  })

  test('two picked devices can be compared', async () => {
    const { screen, router } = await openScreen(address)
    const boxes = screen.findAll<HTMLInputElement>('.devices tbody input[type="checkbox"]')
    for (const box of boxes) await box.setValue(true)
    server.on(readDeviceCurves, () => ({ junctions: [], reflectance: null }))
    await press('Compare 2')
    await arrival(router, 'compare')
    expect(router.currentRoute.value.query['devices']).toBe(`${idOf(201)},${idOf(202)}`)
  })

  test('a collaborator finds nothing to change', async () => {
    server.on(readProject, () => project({ myRoles: ['collaborator'] }))
    await openScreen(address)
    expect(shownText()).not.toContain('Add a device')
    expect(shownText()).not.toContain('Upload')
    expect(shownText()).toContain('T-01')
  })

  test('an archived project says so and offers no changes', async () => {
    server.on(readProject, () => project({ archived: true }))
    await openScreen(address)
    expect(shownText()).toContain('This project is in the archive')
    expect(shownText()).not.toContain('Add a device')
  })

  test('an empty project says the next step', async () => {
    server.on(listDevices, () => page([]))
    await openScreen(address)
    expect(shownText()).toContain('Add the first device')
  })

  test('someone else’s project is not found', async () => {
    server.on(readProject, () => {
      throw new ApiError('NOT_FOUND', { what: 'project' }, 'There is no such project, or you are not a member of it.')
    })
    await openScreen(address)
    expect(shownText()).toContain('There is no such project, or you are not a member of it.')
  })
})

describe('the form of a device', () => {
  test('objects before it sends, then sends what was typed', async () => {
    server.on(createDevice, (request) =>
      device({ ...(request.body as object), id: idOf(203), layers: [], junctions: device().junctions }),
    )
    const { screen } = await openScreen(address)
    await press('Add a device')
    await type('Nominal gap (eV)', 'wide')
    await press('Add device')
    await submit(screen, '.v-dialog form')
    expect(shownText()).toContain('A name is needed.')
    expect(shownText()).toContain('This is not a number. Write it like 1.68.')
    expect(server.requestsOf(createDevice)).toHaveLength(0)
    await type('Name', 'T-03')
    await type('Nominal gap (eV)', '1,68')
    await submit(screen, '.v-dialog form')
    expect(server.requestsOf(createDevice)[0]?.body).toMatchObject({
      name: 'T-03',
      terminals: '2-terminal',
      junctions: [
        { label: 'top', nominalGapEv: 1.68 },
        { label: 'bottom', nominalGapEv: null },
      ],
    })
    expect(shownText()).toContain('T-03 was added.')
  })

  test('asks before what was typed is thrown away', async () => {
    await openScreen(address)
    await press('Add a device')
    await type('Name', 'T-03')
    await press('Cancel')
    expect(shownText()).toContain('Leave without saving?')
    await press('Stay here')
    expect(buttonOf('Add device')).toBeTruthy()
  })
})

describe('a deleted device', () => {
  test('comes back by the button of the notice', async () => {
    server
      .on(readDevice, () => device())
      .on(readMatching, () => summary({}, [18, 20]).matching)
      .on(readDeviceCurves, () => ({ junctions: [], reflectance: null }))
      .on(listScans, () => page([]))
      .on(deleteDevice, () => null)
      .on(restoreDevice, () => device())
    await openScreen(`${address}/devices/${idOf(200)}`)
    await press('Delete')
    await settled()
    expect(shownText()).toContain('T-01 was deleted.')
    await press('Undo')
    expect(server.requestsOf(restoreDevice)).toHaveLength(1)
  })
})

describe('home', () => {
  beforeEach(() => {
    server
      .on(listProjects, (request) => page(request.query['include'] === 'active' ? [project()] : []))
      .on(listSourceFiles, () => page([]))
      .on(listScans, () =>
        page([scan(), scan({ id: idOf(401), state: 'accepted' }), scan({ id: idOf(402), worstFinding: 'note' })]),
      )
  })

  test('lists my projects and, above them, the scans nobody has decided on', async () => {
    const { screen } = await openScreen('/')
    const waiting = screen.findAll('section[aria-labelledby="waiting-heading"] li')
    expect(waiting.map((one) => one.text())).toHaveLength(1)
    expect(waiting[0]?.text()).toContain('“bottom, 4 May” has a caution')
    expect(waiting[0]?.find('a').attributes('href')).toBe(`/projects/${idOf(100)}/devices/${idOf(200)}`)
    expect(shownText()).toContain('2 devices')
  })

  test('asks for nothing of projects in which I decide nothing', async () => {
    server.on(listProjects, (request) =>
      page(request.query['include'] === 'active' ? [project({ myRoles: ['collaborator'] })] : []),
    )
    await openScreen('/')
    expect(server.requestsOf(listScans)).toHaveLength(0)
    expect(shownText()).not.toContain('Waiting for you')
  })

  test('a newcomer is told to make the first project', async () => {
    server.on(listProjects, () => page([])).on(createProject, () => project({ name: 'First' }))
    const { router } = await openScreen('/')
    await press('Make the first project')
    await arrival(router, 'project-new')
    expect(shownText()).toContain('You become its lead, designer and experimentalist')
  })

  test('a list that cannot be read says why and can be asked again', async () => {
    server.on(listProjects, () => {
      throw new ApiError('DATABASE_UNAVAILABLE', {}, 'The database does not answer. Try again in a moment.')
    })
    await openScreen('/')
    expect(shownText()).toContain('The database does not answer. Try again in a moment.')
    server.on(listProjects, (request) => page(request.query['include'] === 'active' ? [project()] : []))
    await press('Try again')
    expect(shownText()).toContain('Perovskite on silicon')
  })
})
