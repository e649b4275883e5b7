/** Root of the project. */
export const ROOT: string
/** Everything that start and test make. */
export const PRIVATE_FOLDER: string
/** Folder for the database server of this name. */
export function databaseFolder(name: string): string
