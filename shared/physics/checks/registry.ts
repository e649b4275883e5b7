import { biasLightTooWeak } from './biasLightTooWeak.js'
import { biasVoltageOff } from './biasVoltageOff.js'
import type { Check } from './check.js'
import { chopperNearMains } from './chopperNearMains.js'
import { coarseStep } from './coarseStep.js'
import { disagreesWithJv } from './disagreesWithJv.js'
import { filterStep } from './filterStep.js'
import { leakage } from './leakage.js'
import { luminescentCoupling } from './luminescentCoupling.js'
import { missingResponse } from './missingResponse.js'
import { noisy } from './noisy.js'
import { notOnPlateau } from './notOnPlateau.js'
import { outOfBounds } from './outOfBounds.js'
import { phaseWanders } from './phaseWanders.js'
import { referenceOutOfDate } from './referenceOutOfDate.js'
import { secondOrderSuspected } from './secondOrderSuspected.js'
import { sumAboveAbsorptance } from './sumAboveAbsorptance.js'
import { truncatedRange } from './truncatedRange.js'

/** Every check, in the order in which findings are listed. A new one is a file and a line here. */
export const CHECKS: readonly Check[] = [
  biasLightTooWeak,
  biasVoltageOff,
  leakage,
  missingResponse,
  luminescentCoupling,
  notOnPlateau,
  sumAboveAbsorptance,
  truncatedRange,
  coarseStep,
  noisy,
  outOfBounds,
  chopperNearMains,
  phaseWanders,
  filterStep,
  secondOrderSuspected,
  disagreesWithJv,
  referenceOutOfDate,
]
