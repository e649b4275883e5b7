import { AccountsAndProjects1764590000000 } from './1764590000000-accountsAndProjects.js'
import { DevicesAndScans1764590100000 } from './1764590100000-devicesAndScans.js'
import { ScanChecks1764590200000 } from './1764590200000-scanChecks.js'
import { Scenarios1764590300000 } from './1764590300000-scenarios.js'

/** Every migration, oldest first. A new one is one file and one line here. */
export const MIGRATIONS = [
  AccountsAndProjects1764590000000,
  DevicesAndScans1764590100000,
  ScanChecks1764590200000,
  Scenarios1764590300000,
]
