import { storeToRefs } from 'pinia'
import { useSessionStore } from '../stores/session.js'

/** Who is signed in and what the installation offers, for views. */
export function useSession() {
  const { person, installation } = storeToRefs(useSessionStore())
  return { person, installation }
}
