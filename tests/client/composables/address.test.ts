import { flushPromises, mount } from '@vue/test-utils'
import { beforeEach, describe, expect, test } from 'vitest'
import { defineComponent, h, ref } from 'vue'
import { createMemoryHistory, createRouter, RouterView, type Router } from 'vue-router'
import { useAddressState } from '../../../src/composables/addressState.js'
import { useSpectrumChoice } from '../../../src/composables/spectrumChoice.js'
import { useUnsavedGuard } from '../../../src/composables/unsavedGuard.js'
import { idOf } from '../samples.js'

/** Runs a composable inside a screen at an address. */
async function inScreen<T>(address: string, setup: () => T): Promise<{ result: T; router: Router }> {
  let result!: T
  const Screen = defineComponent({
    setup() {
      result = setup()
      return () => h('p')
    },
  })
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [
      { path: '/', component: Screen },
      { path: '/elsewhere', component: { render: () => null } },
    ],
  })
  await router.push(address)
  mount(RouterView, { global: { plugins: [router] } })
  await flushPromises()
  return { result, router }
}

describe('the spectrum in the address', () => {
  test.each([
    ['/', { spectrum: 'AM1.5G', scaleToWM2: undefined }],
    ['/?spectrum=AM0&scale=1000', { spectrum: 'AM0', scaleToWM2: 1000 }],
    [`/?spectrum=${idOf(900)}`, { spectrum: idOf(900), scaleToWM2: undefined }],
    ['/?spectrum=AM9&scale=1000', { spectrum: 'AM1.5G' }],
    ['/?scale=-5', { spectrum: 'AM1.5G' }],
  ])('%s is read as %o', async (address, choice) => {
    const { result } = await inScreen(address, useSpectrumChoice)
    expect(result.choice.value).toEqual(choice)
  })

  test('a choice is written, and leaves what else stands in the address alone', async () => {
    const { result, router } = await inScreen('/?search=T-0', useSpectrumChoice)
    result.spectrumId.value = 'AM1.5D'
    await flushPromises()
    result.scaleToWM2.value = 900
    await flushPromises()
    expect(router.currentRoute.value.query).toEqual({ search: 'T-0', spectrum: 'AM1.5D', scale: '900' })
    expect(result.asQuery.value).toEqual({ spectrum: 'AM1.5D', scale: '900' })
    result.spectrumId.value = 'AM1.5G'
    await flushPromises()
    result.scaleToWM2.value = null
    await flushPromises()
    expect(router.currentRoute.value.fullPath).toBe('/?search=T-0')
  })
})

test('state in the address leaves no trace when it is what is usual', async () => {
  const { result, router } = await inScreen('/?sort=-name', () => useAddressState('sort', 'name'))
  expect(result.value).toBe('-name')
  result.value = 'name'
  await flushPromises()
  expect(router.currentRoute.value.fullPath).toBe('/')
})

describe('leaving a form', () => {
  const hasEdits = ref(false)
  const open = () => inScreen('/', () => useUnsavedGuard(hasEdits))
  beforeEach(() => {
    hasEdits.value = false
  })

  test('without edits nobody is asked', async () => {
    const { result, router } = await open()
    await router.push('/elsewhere')
    expect(router.currentRoute.value.path).toBe('/elsewhere')
    expect(result.isAsking.value).toBe(false)
  })

  test.each([
    ['stay', '/'],
    ['leave', '/elsewhere'],
  ] as const)('with edits the answer “%s” decides', async (answer, path) => {
    const { result, router } = await open()
    hasEdits.value = true
    const going = router.push('/elsewhere')
    await flushPromises()
    expect(result.isAsking.value).toBe(true)
    expect(router.currentRoute.value.path).toBe('/')
    result[answer]()
    await going
    expect(router.currentRoute.value.path).toBe(path)
    expect(result.isAsking.value).toBe(false)
  })

  test('another view of the same screen is not leaving', async () => {
    const { result, router } = await open()
    hasEdits.value = true
    await router.push('/?search=x')
    expect(result.isAsking.value).toBe(false)
  })

  test('closing the tab asks in the browser’s words', async () => {
    await open()
    const event = () => {
      const closing = new Event('beforeunload', { cancelable: true })
      window.dispatchEvent(closing)
      return closing.defaultPrevented
    }
    expect(event()).toBe(false)
    hasEdits.value = true
    expect(event()).toBe(true)
  })
})
