import { startBuiltApplication } from '../support/builtApplication.js'

/** The built application with the demonstration, on a database of its own and a free port, for one run of the tests. */
export default async function setup(): Promise<() => Promise<void>> {
  const application = await startBuiltApplication({ DEMONSTRATION: 'yes', RATE_LIMITS: 'off' })
  process.env['TIERLIGHT_TEST_ADDRESS'] = application.address
  return () => application.stop()
}
