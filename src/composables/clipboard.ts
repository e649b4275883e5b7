import { useNotices } from './notices.js'

/** Copies text and says so. */
export function useCopy() {
  const notices = useNotices()
  return async (text: string, said: string): Promise<void> => {
    try {
      await navigator.clipboard.writeText(text)
      notices.show({ text: said })
    } catch {
      notices.failed(new Error('The browser does not allow copying here.'))
    }
  }
}
