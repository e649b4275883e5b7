import 'vuetify/styles/core'
import 'vuetify/styles/utilities'
import { createVuetify, type ThemeDefinition } from 'vuetify'
import { aliases, mdi } from 'vuetify/iconsets/mdi-svg'

/**
 * The look, in one file: colours, density, corners, shadows. Warm paper and ink by day, deep blue-black by night; one
 * accent, kept for the junction that limits. The variables become CSS custom properties in `assets/palette.css`.
 * Junction colours run along the spectrum from short waves to long, with equal weight on the ground they stand on;
 * charts pair each with a line style and the junction's number.
 */
const light: ThemeDefinition = {
  dark: false,
  colors: {
    background: '#faf7f0',
    surface: '#fffdf8',
    'surface-variant': '#2a303c',
    'on-surface-variant': '#f6f2e8',
    primary: '#24466b',
    secondary: '#57534a',
    success: '#2c6b45',
    warning: '#855200',
    error: '#a3123a',
    info: '#24466b',
    'on-background': '#1d222c',
    'on-surface': '#1d222c',
    'on-primary': '#ffffff',
    'on-error': '#ffffff',
    'on-warning': '#ffffff',
    'on-success': '#ffffff',
  },
  variables: {
    'medium-emphasis-opacity': 0.75,
    'border-opacity': 0.18,
    ink: '#1d222c',
    'ink-soft': '#575a63',
    paper: '#faf7f0',
    sheet: '#fffdf8',
    rule: '#dcd5c5',
    backdrop: '#e2d9c4',
    limiting: '#b92b1f',
    note: '#24466b',
    caution: '#855200',
    reject: '#a3123a',
    'junction-1': '#5b2e91',
    'junction-2': '#1f6fb2',
    'junction-3': '#0b7a63',
    'junction-4': '#80690a',
  },
}

const dark: ThemeDefinition = {
  dark: true,
  colors: {
    background: '#0a101b',
    surface: '#111927',
    'surface-variant': '#d9d5ca',
    'on-surface-variant': '#151b26',
    primary: '#a9c6e8',
    secondary: '#b7b3a8',
    success: '#7fc79b',
    warning: '#e5b35c',
    error: '#ff8fa8',
    info: '#a9c6e8',
    'on-background': '#e9e6de',
    'on-surface': '#e9e6de',
    'on-primary': '#0a101b',
    'on-error': '#0a101b',
    'on-warning': '#0a101b',
    'on-success': '#0a101b',
  },
  variables: {
    'medium-emphasis-opacity': 0.75,
    'border-opacity': 0.22,
    ink: '#e9e6de',
    'ink-soft': '#a9b0bd',
    paper: '#0a101b',
    sheet: '#111927',
    rule: '#2a3446',
    backdrop: '#232e42',
    limiting: '#ff7b66',
    note: '#a9c6e8',
    caution: '#e5b35c',
    reject: '#ff8fa8',
    'junction-1': '#b496f0',
    'junction-2': '#6fb4f2',
    'junction-3': '#4fc3a1',
    'junction-4': '#d9bc4a',
  },
}

const field = { variant: 'outlined', density: 'compact', color: 'primary', hideDetails: 'auto', rounded: 'sm' } as const

export const createTheme = (defaultTheme: 'system' | 'light' | 'dark') =>
  createVuetify({
    theme: { defaultTheme, themes: { light, dark }, variations: false, utilities: true, transition: false },
    icons: { defaultSet: 'mdi', aliases, sets: { mdi } },
    defaults: {
      VBtn: { rounded: 'sm', elevation: 0 },
      VCard: { rounded: 'sm', elevation: 0, border: true },
      VDialog: { maxWidth: 640 },
      VMenu: { offset: 4 },
      VList: { density: 'compact' },
      VTextField: field,
      VTextarea: { ...field, autoGrow: true, rows: 2 },
      VSelect: field,
      VAutocomplete: field,
      VCombobox: field,
      VFileInput: field,
      VNumberInput: { ...field, controlVariant: 'hidden' },
      VCheckbox: { density: 'compact', color: 'primary', hideDetails: 'auto' },
      VRadioGroup: { density: 'compact', color: 'primary', hideDetails: 'auto' },
      VSwitch: { density: 'compact', color: 'primary', hideDetails: 'auto', inset: true },
      VAlert: { variant: 'tonal', density: 'compact', rounded: 'sm' },
      VChip: { rounded: 'sm', size: 'small', variant: 'tonal' },
      VTable: { density: 'compact' },
      VDataTable: { density: 'compact' },
      VTooltip: { openDelay: 300 },
    },
  })
