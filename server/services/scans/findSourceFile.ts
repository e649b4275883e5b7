import { ApiError } from '../../../shared/contract/errors.js'
import type { SourceFile } from '../../database/entities/SourceFile.js'
import { sourceFileOfProject } from '../../database/repositories/sourceFiles.js'
import type { Work } from '../../database/transaction.js'

export async function findSourceFile(work: Work, projectId: string, sourceFileId: string): Promise<SourceFile> {
  const file = await sourceFileOfProject(work, projectId, sourceFileId)
  if (!file) throw new ApiError('NOT_FOUND', { what: 'file' }, 'There is no such file in this project.')
  return file
}
