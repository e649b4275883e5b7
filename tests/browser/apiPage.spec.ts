import { AxeBuilder } from '@axe-core/playwright'
import { expect, test } from '@playwright/test'

for (const colorScheme of ['light', 'dark'] as const)
  test(`the page of the API can be read by everyone in the ${colorScheme} theme`, async ({ page }) => {
    await page.emulateMedia({ colorScheme })
    await page.goto('/api')
    await expect(page.getByRole('heading', { level: 1 })).toHaveText('Tierlight API')
    await page.getByRole('navigation', { name: 'Groups' }).getByRole('link', { name: 'Scans' }).click()
    await expect(page.getByRole('heading', { level: 2, name: 'Scans', exact: true })).toBeInViewport()
    const results = await new AxeBuilder({ page }).withTags(['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa']).analyze()
    expect(results.violations.map(({ id, nodes }) => [id, nodes[0]?.target])).toEqual([])
  })
