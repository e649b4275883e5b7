import { IsNull } from 'typeorm'
import { Scan } from '../entities/Scan.js'
import { SourceFile } from '../entities/SourceFile.js'
import type { Work } from '../transaction.js'

export async function databaseState(work: Work) {
  const before = performance.now()
  const [row] = (await work.query('SELECT VERSION() AS version')) as { version: string }[]
  const roundTripMs = performance.now() - before
  const [applied] = (await work.query('SELECT COUNT(*) AS count FROM migrations')) as { count: string | number }[]
  return {
    answers: true,
    version: row?.version ?? '',
    roundTripMs: Math.round(roundTripMs * 100) / 100,
    migrations: Number(applied?.count ?? 0),
  }
}

export async function storageState(work: Work) {
  const sum = await work
    .createQueryBuilder(SourceFile, 'file')
    .select('COUNT(*)', 'count')
    .addSelect('COALESCE(SUM(file.sizeBytes), 0)', 'bytes')
    .getRawOne<{ count: string; bytes: string }>()
  return {
    sourceFiles: Number(sum?.count ?? 0),
    sourceFileBytes: Number(sum?.bytes ?? 0),
    scans: await work.countBy(Scan, { deletedAt: IsNull() }),
  }
}
