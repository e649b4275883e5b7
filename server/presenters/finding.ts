import type { Finding as FindingReply } from '../../shared/contract/findings.js'
import type { Finding } from '../database/entities/Finding.js'

/** Needs the relation `answeredBy`. */
export function presentFinding(finding: Finding): FindingReply {
  const { id, scanId, check, title, severity, message, advice, bandsNm, numbers, junctionPosition } = finding
  const { answerKind, answeredBy, answeredAt, repeatedAsScanId, answerReason } = finding
  return {
    id,
    scanId,
    check,
    title,
    severity,
    message,
    advice,
    bandsNm,
    numbers,
    junctionPosition,
    answer:
      answerKind && answeredBy && answeredAt
        ? {
            kind: answerKind,
            repeatedAsScanId,
            reason: answerReason,
            by: { id: answeredBy.id, name: answeredBy.name },
            at: answeredAt.toISOString(),
          }
        : null,
  }
}
