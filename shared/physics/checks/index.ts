export * from './check.js'
export * from './finding.js'
export { CHECKS } from './registry.js'
export * from './runChecks.js'
