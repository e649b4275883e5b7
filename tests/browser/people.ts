import type { Locator, Page } from '@playwright/test'
import { DEMONSTRATION_PASSWORD, DEMONSTRATION_PEOPLE } from '../../server/demonstration/signIns.js'

type Key = (typeof DEMONSTRATION_PEOPLE)[number]['key']

/** Signs in through the page, as one of the demonstration people. */
export async function signInAs(page: Page, key: Key): Promise<void> {
  const { email } = DEMONSTRATION_PEOPLE.find((person) => person.key === key)!
  await page.goto('/sign-in')
  await page.getByLabel('Mail address').fill(email)
  await page.getByLabel('Password', { exact: true }).fill(DEMONSTRATION_PASSWORD)
  await page.getByRole('button', { name: 'Sign in', exact: true }).click()
  await page.waitForURL((url) => !url.pathname.includes('sign-in'))
}

interface Listed {
  items: { id: string; name: string; device: { id: string; name: string } }[]
}

/** Reads the API with the session of the page. */
export async function api<Reply = Listed>(page: Page, path: string): Promise<Reply> {
  const reply = await page.request.get(path)
  if (!reply.ok()) throw new Error(`${path} answered ${reply.status()}: ${await reply.text()}`)
  return (await reply.json()) as Reply
}

/** Addresses of a demonstration project and its devices by name. */
export async function demonstration(
  page: Page,
): Promise<{ project: string; device: (name: string) => string; ids: string[] }> {
  const projects = await api(page, '/api/projects')
  const project = projects.items.find((one) => one.name.includes('Perovskite'))!
  const devices = await api(page, `/api/projects/${project.id}/devices`)
  return {
    project: `/projects/${project.id}`,
    ids: devices.items.map((one) => one.device.id),
    device: (name) =>
      `/projects/${project.id}/devices/${devices.items.find((one) => one.device.name === name)!.device.id}`,
  }
}

/** Chooses from a list field by the keyboard, as its own markup covers the field for a pointer. */
export async function choose(page: Page, field: Locator, option: string | RegExp): Promise<void> {
  await field.press('ArrowDown')
  await page.getByRole('option', { name: option }).click()
  await page.keyboard.press('Escape')
}
