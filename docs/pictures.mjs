import { chromium } from '@playwright/test'
import { mkdirSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'

/**
 * Makes the pictures of the README from a running demonstration: `npm start` in one terminal, then
 * `node docs/pictures.mjs http://127.0.0.1:4180` in another.
 */
const address = process.argv[2] ?? 'http://127.0.0.1:4180'
const folder = join(dirname(fileURLToPath(import.meta.url)), 'pictures')
mkdirSync(folder, { recursive: true })

const browser = await chromium.launch({
  executablePath: '/usr/bin/chromium',
  args: [
    '--no-sandbox',
    '--disable-gpu',
    '--disable-quic',
    '--no-first-run',
    '--disable-background-networking',
    '--disable-sync',
  ],
})
const { installation } = await (await fetch(`${address}/api/session`)).json()
const person = installation.demonstrationPeople.find((one) => one.role.startsWith('experimentalist'))
if (!person) throw new Error('This installation shows no demonstration; start it with npm start.')

async function signedIn(colorScheme) {
  const context = await browser.newContext({ colorScheme, viewport: { width: 1280, height: 860 }, locale: 'en-GB' })
  const page = await context.newPage()
  await page.goto(`${address}/sign-in`)
  await page.getByLabel('Mail address').fill(person.email)
  await page.getByLabel('Password', { exact: true }).fill(person.password)
  await page.getByRole('button', { name: 'Sign in', exact: true }).click()
  await page.waitForURL((url) => !url.pathname.includes('sign-in'))
  return page
}

async function picture(page, path, name, prepare = async () => {}) {
  await page.goto(address + path)
  await page.waitForLoadState('networkidle')
  await prepare(page)
  await page.screenshot({ path: join(folder, `${name}.png`) })
}

const light = await signedIn('light')
const read = async (path) => (await light.request.get(address + path)).json()
const projects = await read('/api/projects')
const project = projects.items.find((one) => one.name.includes('Perovskite'))
const devices = await read(`/api/projects/${project.id}/devices`)
const device = (name) =>
  `/projects/${project.id}/devices/${devices.items.find((one) => one.device.name === name).device.id}`

await picture(light, `/projects/${project.id}`, 'project')
await picture(light, device('Split 480 nm'), 'device')
await picture(light, device('Repeat 500 nm'), 'findings', (page) =>
  page.getByRole('heading', { name: 'Can the scans be trusted?' }).evaluate((heading) => heading.scrollIntoView()),
)
const compared = ['Split 360 nm', 'Split 540 nm'].map(
  (name) => devices.items.find((one) => one.device.name === name).device.id,
)
await picture(await signedIn('dark'), `/projects/${project.id}/compare?devices=${compared.join(',')}`, 'compare')
await browser.close()
