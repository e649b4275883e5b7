import type { SourceFile as SourceFileReply } from '../../../shared/contract/scans.js'
import type { SourceFile } from '../../database/entities/SourceFile.js'
import { scansOfSourceFiles } from '../../database/repositories/scans.js'
import type { Work } from '../../database/transaction.js'
import { presentSourceFile } from '../../presenters/scan.js'

/** The files with the scans that were made of each. */
export async function presentSourceFiles(work: Work, files: readonly SourceFile[]): Promise<SourceFileReply[]> {
  const scans = await scansOfSourceFiles(
    work,
    files.map((file) => file.id),
  )
  return files.map((file) =>
    presentSourceFile(
      file,
      scans.filter((scan) => scan.sourceFileId === file.id).map((scan) => scan.id),
    ),
  )
}

export async function presentOneSourceFile(work: Work, file: SourceFile): Promise<SourceFileReply> {
  const [reply] = await presentSourceFiles(work, [file])
  return reply!
}
