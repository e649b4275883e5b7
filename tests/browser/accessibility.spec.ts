import { AxeBuilder } from '@axe-core/playwright'
import { expect, test, type Page } from '@playwright/test'
import { demonstration, signInAs } from './people.js'

/** WCAG 2.2 AA as far as a machine can see, on every page, in both themes. */
const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa']

async function expectAccessible(page: Page, address: string): Promise<void> {
  await page.goto(address)
  await page.waitForLoadState('networkidle')
  await expect(
    page
      .getByRole('heading', { level: 1 })
      .or(page.getByRole('heading', { level: 2 }))
      .first(),
  ).toBeVisible()
  const { violations } = await new AxeBuilder({ page }).withTags(TAGS).analyze()
  const found = violations.map((one) => `${one.id}: ${one.nodes.map((node) => node.target.join(' ')).join('; ')}`)
  expect(found, address).toEqual([])
  const overflow = (await page.evaluate('document.documentElement.scrollWidth - window.innerWidth')) as number
  expect(overflow, `${address} scrolls sideways`).toBeLessThanOrEqual(0)
}

for (const colorScheme of ['light', 'dark'] as const) {
  test.describe(`in the ${colorScheme} theme`, () => {
    test.use({ colorScheme })

    test('pages without a sign-in', async ({ page }) => {
      for (const address of ['/sign-in', '/reset-password', '/nowhere']) await expectAccessible(page, address)
    })

    test('pages of a project', async ({ page }) => {
      await signInAs(page, 'lead')
      const { project, device, ids } = await demonstration(page)
      const addresses = [
        '/',
        '/account',
        project,
        device('Split 480 nm'),
        device('Repeat 500 nm'),
        `${project}/compare?devices=${ids.slice(0, 2).join(',')}`,
        `${project}/spectra`,
        `${project}/people`,
        `${project}/activity`,
        `${project}/settings`,
      ]
      for (const address of addresses) await expectAccessible(page, address)
    })

    test('the upload page and the pages of the administrator', async ({ page, context }) => {
      await signInAs(page, 'experimentalist')
      const { project } = await demonstration(page)
      await expectAccessible(page, `${project}/upload`)
      await context.clearCookies()
      await signInAs(page, 'administrator')
      for (const part of ['accounts', 'outbox', 'health', 'audit-trail'])
        await expectAccessible(page, `/administration/${part}`)
    })
  })
}

test('pages fit a narrow screen', async ({ page }) => {
  await page.setViewportSize({ width: 360, height: 740 })
  await signInAs(page, 'lead')
  const { project, device } = await demonstration(page)
  for (const address of ['/', project, device('Split 480 nm'), `${project}/people`, '/account'])
    await expectAccessible(page, address)
})
