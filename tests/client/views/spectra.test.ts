import { beforeEach, expect, test } from 'vitest'
import { readProject } from '../../../shared/contract/projects.js'
import { deleteSpectrum, listSpectra, readSpectrum } from '../../../shared/contract/spectra.js'
import { FakeServer } from '../fakeServer.js'
import { am15g, idOf, page, person, project, session } from '../samples.js'
import { openScreen, press, shownText } from '../screen.js'
import { listDevices } from '../../../shared/contract/matching.js'

const simulator = {
  ...am15g,
  id: idOf(900),
  kind: 'uploaded' as const,
  name: 'Simulator A',
  source: 'simulator.csv',
  totalIrradianceWM2: 987.6,
  rangeNm: [300, 1200] as [number, number],
  uploadedBy: { id: person.id, name: person.name },
  uploadedAt: '2026-05-01T08:00:00.000Z',
}
const address = `/projects/${idOf(100)}/spectra`
let server: FakeServer
beforeEach(() => {
  server = new FakeServer(session())
    .on(readProject, () => project())
    .on(listSpectra, () => ({ items: [am15g, simulator] }))
    .on(listDevices, () => page([]))
    .on(readSpectrum, (request) => ({
      spectrum: request.params['spectrumId'] === simulator.id ? simulator : am15g,
      curve: { wavelengthNm: [300, 500, 1200], values: [0.1, 1.5, 0.5] },
    }))
})

test('each spectrum stands with its total irradiance, range and source', async () => {
  const { screen } = await openScreen(address)
  const rows = screen.findAll('tbody tr').map((row) => row.text().replace(/\s+/g, ' '))
  expect(rows[0]).toContain('1000.37 W/m²')
  expect(rows[0]).toContain('ASTM G173-03')
  expect(rows[1]).toContain('987.60 W/m²')
  expect(rows[1]).toContain('300 to 1200 nm')
  expect(rows[1]).toContain('Ines Okafor, 1 May 2026')
})

test('the chosen one is drawn, and the address says which', async () => {
  const { screen, router } = await openScreen(address)
  await press('Simulator A')
  expect(router.currentRoute.value.query['shown']).toBe(simulator.id)
  expect(screen.find('figure figcaption').text()).toContain('Simulator A, 987.60\u00a0W/m²')
})

test('only an uploaded spectrum can be deleted, and only after a question', async () => {
  server.on(deleteSpectrum, () => null)
  await openScreen(`${address}?shown=${simulator.id}`)
  expect(shownText()).not.toContain('Delete AM1.5G')
  await press('Delete Simulator A')
  expect(server.requestsOf(deleteSpectrum)).toHaveLength(0)
  await press('Delete the spectrum')
  expect(server.requestsOf(deleteSpectrum)[0]?.params['spectrumId']).toBe(simulator.id)
  expect(shownText()).toContain('Simulator A was deleted.')
})

test('a collaborator reads spectra and changes none', async () => {
  server.on(readProject, () => project({ myRoles: ['collaborator'] }))
  await openScreen(address)
  expect(shownText()).not.toContain('Upload a spectrum')
  expect(shownText()).toContain('Simulator A')
})
