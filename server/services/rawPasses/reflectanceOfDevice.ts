import { makeCurve, type Curve } from '../../../shared/physics/curve.js'
import { scanHeadsOfDevices, scansWithCurves } from '../../database/repositories/scans.js'
import type { Work } from '../../database/transaction.js'
import { scansInUse } from '../matching/scansInUse.js'

/** The reflectance scan that stands for a device. */
export async function reflectanceOfDevice(work: Work, deviceId: string): Promise<Curve | null> {
  const head = scansInUse(await scanHeadsOfDevices(work, [deviceId])).find((one) => one.quantity === 'reflectance')
  if (!head) return null
  const [scan] = await scansWithCurves(work, [head.id])
  return scan ? makeCurve(scan.wavelengthNm, scan.values) : null
}
