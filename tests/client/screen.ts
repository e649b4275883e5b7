import { VueQueryPlugin } from '@tanstack/vue-query'
import { flushPromises, mount, type VueWrapper } from '@vue/test-utils'
import { createPinia, setActivePinia } from 'pinia'
import { vi } from 'vitest'
import { createMemoryHistory, type Router } from 'vue-router'
import * as components from 'vuetify/components'
import App from '../../src/App.vue'
import { createQueryClient } from '../../src/plugins/query.js'
import { createTheme } from '../../src/plugins/vuetify.js'
import { createAppRouter } from '../../src/router/index.js'

/** The whole application at an address, as the browser would show it, over whatever `fetch` answers. */
export async function openScreen(address: string) {
  const pinia = createPinia()
  setActivePinia(pinia)
  const router = createAppRouter(createMemoryHistory())
  const queryClient = createQueryClient(() => undefined)
  queryClient.setDefaultOptions({ queries: { retry: false } })
  await router.push(address)
  const screen = mount(App, {
    attachTo: document.body,
    global: { plugins: [pinia, createTheme('light'), [VueQueryPlugin, { queryClient }], router], components },
  })
  await settled()
  return { screen, router }
}

/** Lets answers arrive and the page follow; a view that asks again after an answer needs more than one round. */
export async function settled(): Promise<void> {
  for (let round = 0; round < 6; round++) {
    await flushPromises()
    await new Promise((resolve) => setTimeout(resolve))
  }
}

/** What stands on the page, dialogs and notices included. */
export const shownText = () => document.body.textContent.replace(/\s+/g, ' ')

export function fieldOf(label: string, within: ParentNode = document.body): HTMLInputElement {
  const labels = [...within.querySelectorAll<HTMLLabelElement>('label')]
  const found = labels.find((one) => one.htmlFor && one.textContent.trim() === label)
  const field = found ? document.getElementById(found.htmlFor) : null
  if (!(field instanceof HTMLInputElement || field instanceof HTMLTextAreaElement)) {
    throw new Error(
      `There is no field “${label}”; there are: ${labels.map((one) => one.textContent.trim()).join(', ')}`,
    )
  }
  return field as HTMLInputElement
}

export async function type(label: string, text: string, within?: ParentNode): Promise<void> {
  const field = fieldOf(label, within)
  field.value = text
  field.dispatchEvent(new Event('input', { bubbles: true }))
  await flushPromises()
}

export function buttonOf(name: string, within: ParentNode = document.body): HTMLButtonElement {
  const found = [...within.querySelectorAll<HTMLButtonElement>('button, a.v-btn')].find((one) => nameOf(one) === name)
  if (!found) throw new Error(`There is no button “${name}”.`)
  return found
}

function nameOf(button: HTMLElement): string {
  const copy = button.cloneNode(true) as HTMLElement
  copy.querySelectorAll('[aria-hidden="true"]').forEach((one) => one.remove())
  return button.getAttribute('aria-label') ?? copy.textContent.replace(/\s+/g, ' ').trim()
}

export async function press(name: string, within?: ParentNode): Promise<void> {
  buttonOf(name, within).click()
  await settled()
}

/** Waits until the router has arrived; a screen that is opened for the first time is loaded first. */
export async function arrival(router: Router, name: string): Promise<void> {
  await vi.waitUntil(() => router.currentRoute.value.name === name, { timeout: 10_000 })
  await settled()
}

/** Enter in a form, or its submit button. */
export async function submit(screen: VueWrapper, form = 'form'): Promise<void> {
  const element = screen.element.parentElement?.querySelector(form) ?? document.body.querySelector(form)
  element?.dispatchEvent(new Event('submit', { bubbles: true, cancelable: true }))
  await settled()
}
