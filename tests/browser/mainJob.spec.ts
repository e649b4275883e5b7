import { expect, test } from '@playwright/test'
import { makeCurve } from '../../shared/physics/curve.js'
import { shortCircuitCurrentDensity } from '../../shared/physics/currents.js'
import { referenceSpectrum } from '../../shared/physics/spectrum.js'
import { bottomCsv, bottomEqe, lampTsv, reflectanceWorkbook, topCsv, topEqe, wavelengthsNm } from './measurements.js'
import { api, choose, signInAs } from './people.js'

/** What the page has to say, from the same curves through the engine. */
function currentOf(eqe: (nm: number) => number, spectrum: 'AM1.5G' | 'AM0'): string {
  const curve = makeCurve(wavelengthsNm, wavelengthsNm.map(eqe))
  return shortCircuitCurrentDensity(curve, referenceSpectrum(spectrum)).toFixed(2)
}

test('a group goes from its own files to the limiting junction', async ({ page, browser }) => {
  const projectName = `Rooftop cells ${Date.now()}`
  await signInAs(page, 'lead')

  await test.step('make a project and invite a colleague', async () => {
    await page.getByRole('link', { name: 'New project' }).click()
    await page.getByLabel('Name').fill(projectName)
    await page.getByRole('button', { name: /make the project|make project/i }).click()
    await expect(page.getByRole('heading', { name: projectName })).toBeVisible()
    await page.getByRole('link', { name: 'People' }).click()
    await page.getByLabel('E-mail address').fill('nils@fennmoor.example')
    await choose(page, page.getByRole('combobox', { name: 'Roles' }), 'experimentalist')
    await page.getByRole('button', { name: 'Invite', exact: true }).click()
    await expect(page.getByRole('cell', { name: 'nils@fennmoor.example' })).toBeVisible()
  })

  await test.step('the colleague accepts by the link that the administrator finds in the outbox', async () => {
    const context = await browser.newContext()
    const other = await context.newPage()
    await signInAs(other, 'administrator')
    const outbox = await api<{ items: { to: string; text: string }[] }>(other, '/api/administration/outbox')
    const link = /https?:\/\/\S+\/invitations\/\S+/.exec(
      outbox.items.find((mail) => mail.to === 'nils@fennmoor.example')!.text,
    )![0]
    await other.context().clearCookies()
    await other.goto(new URL(link).pathname)
    await expect(other.getByText(projectName)).toBeVisible()
    await other.getByLabel(/name/i).first().fill('Nils Aren')
    await other
      .getByLabel(/password/i)
      .first()
      .fill('a long enough password')
    await other.getByRole('button', { name: /accept|join/i }).click()
    await expect(other.getByRole('heading', { name: projectName })).toBeVisible()
    await context.close()
  })

  await test.step('describe a device', async () => {
    await page.getByRole('link', { name: 'Devices' }).click()
    await page.getByRole('button', { name: 'Add the first device' }).click()
    const dialog = page.getByRole('dialog')
    await dialog.getByLabel('Name').fill('Cell R1')
    await dialog.getByRole('button', { name: 'Add device' }).click()
    await expect(page.getByRole('link', { name: 'Cell R1' })).toBeVisible()
  })

  await test.step('upload two scans and a reflectance, see them read, confirm', async () => {
    await page.getByRole('link', { name: 'Upload', exact: true }).click()
    await page.getByLabel('Files of scans').setInputFiles([
      { name: 'R1 top.csv', mimeType: 'text/csv', buffer: topCsv() },
      { name: 'R1 second.csv', mimeType: 'text/csv', buffer: bottomCsv() },
      {
        name: 'R1 reflectance.xlsx',
        mimeType: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
        buffer: reflectanceWorkbook(),
      },
    ])
    const topFile = page.getByRole('article', { name: 'R1 top.csv' })
    await expect(topFile.getByRole('application', { name: /As it will be read/ })).toBeVisible()
    await topFile.getByRole('button', { name: 'Show the rows of the file' }).click()
    await expect(topFile.getByRole('columnheader', { name: /EQE \(%\)/ })).toBeVisible()
    await page.getByRole('button', { name: 'Confirm 3 of 3 files' }).click()
    await expect(page.getByText('limits the stack')).toBeVisible()
  })

  await test.step('read the device page: limiting junction, currents, hover, band, spectra', async () => {
    await expect(page.getByText('Junction 2 bottom limits the stack.')).toBeVisible()
    const currents = page.getByRole('region', { name: 'Subcell currents' })
    await expect(currents.getByRole('row', { name: /1 top/ })).toContainText(currentOf(topEqe, 'AM1.5G').slice(0, 4))
    await expect(currents.getByRole('row', { name: /2 bottom/ })).toContainText(
      currentOf(bottomEqe, 'AM1.5G').slice(0, 4),
    )

    const chart = page.getByRole('application', { name: /External quantum efficiency/ })
    await chart.focus()
    await chart.press('ArrowRight')
    await chart.press('Shift+ArrowRight')
    await chart.press('Shift+ArrowRight')
    await expect(page.getByText(/mA\/cm², .* % of its current/).first()).toBeVisible()
    const box = (await chart.boundingBox())!
    await page.mouse.move(box.x + box.width / 3, box.y + box.height / 2)
    await expect(page.locator('.readout').first()).toContainText(/\d+ nm/)

    await choose(page, page.getByRole('combobox', { name: 'Spectrum' }), /AM0/)
    await expect(page).toHaveURL(/spectrum=AM0/)
    await expect(currents.getByRole('row', { name: /1 top/ })).toContainText(currentOf(topEqe, 'AM0').slice(0, 4))
  })

  await test.step('accept one scan, exclude another with a reason, take it back', async () => {
    const scans = page.getByRole('region', { name: 'Scans of this device' })
    await scans.getByRole('row', { name: /1 top/ }).getByRole('button', { name: 'Accept' }).click()
    await expect(scans.getByRole('row', { name: /1 top/ })).toContainText('Accepted')
    await scans
      .getByRole('row', { name: /2 bottom/ })
      .getByRole('button', { name: 'Exclude' })
      .click()
    await page.getByRole('dialog').getByRole('button', { name: 'Exclude' }).click()
    await expect(page.getByText('Give a reason in a few words.')).toBeVisible()
    await page.getByLabel('Why?').fill('The lamp flickered half-way.')
    await page.getByRole('dialog').getByRole('button', { name: 'Exclude' }).click()
    await expect(page.getByText('The stack cannot be judged yet.')).toBeVisible()
    await scans
      .getByRole('row', { name: /2 bottom/ })
      .getByRole('button', { name: 'Accept' })
      .click()
    await expect(page.getByText('Junction 2 bottom limits the stack.')).toBeVisible()
  })

  await test.step('a spectrum of the project', async () => {
    await page.getByRole('link', { name: 'Spectra' }).click()
    await page
      .locator('input[type=file]')
      .setInputFiles({ name: 'lamp.tsv', mimeType: 'text/tab-separated-values', buffer: lampTsv() })
    await page.getByLabel('Name of the spectrum').fill('Our lamp')
    await page
      .getByRole('button', { name: /save|add|make/i })
      .last()
      .click()
    await expect(
      page
        .getByRole('cell', { name: 'Our lamp' })
        .or(page.getByRole('rowheader', { name: 'Our lamp' }))
        .first(),
    ).toBeVisible()
  })
})

test('the table of devices sorts, filters and compares', async ({ page }) => {
  await signInAs(page, 'designer')
  await page
    .getByRole('link', { name: /Perovskite on silicon/ })
    .first()
    .click()
  await expect(page.getByRole('link', { name: 'Split 360 nm' })).toBeVisible()
  await page.getByRole('searchbox', { name: 'Search' }).fill('Split')
  await expect(page.getByRole('link', { name: 'Repeat 500 nm' })).toHaveCount(0)
  await page.getByRole('button', { name: /Mismatch/ }).click()
  await expect(page).toHaveURL(/sort=/)
  for (const name of ['Split 360 nm', 'Split 540 nm'])
    await page
      .getByRole('row', { name: new RegExp(name) })
      .getByRole('checkbox')
      .check()
  await page.getByRole('button', { name: /Compare/ }).click()
  await expect(page).toHaveURL(/compare\?devices=/)
  const table = page.getByRole('region', { name: 'Currents of the chosen devices' })
  await expect(table.getByRole('row', { name: /Split 360 nm/ })).toContainText('1 Top')
  await expect(table.getByRole('row', { name: /Split 540 nm/ })).toContainText('2 Bottom')
  await expect(page.getByRole('application', { name: /Difference from Split/ })).toBeVisible()
})
