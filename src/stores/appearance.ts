import { defineStore } from 'pinia'
import { ref, watch } from 'vue'

export const THEME_CHOICES = ['system', 'light', 'dark'] as const
export type ThemeChoice = (typeof THEME_CHOICES)[number]
const KEY = 'tierlight.theme'

/** Reads the choice kept in this browser; the system's own where none was made. */
export function rememberedTheme(): ThemeChoice {
  const kept = localStorage.getItem(KEY)
  return THEME_CHOICES.find((choice) => choice === kept) ?? 'system'
}

/** Light, dark or as the system says; kept in this browser. */
export const useAppearanceStore = defineStore('appearance', () => {
  const theme = ref<ThemeChoice>(rememberedTheme())
  watch(theme, (choice) => localStorage.setItem(KEY, choice), { flush: 'sync' })
  return { theme }
})
