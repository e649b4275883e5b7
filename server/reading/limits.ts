/** How much a file may hold. Far above any scan, far below what would hurt the server. */
export const READING_LIMITS = {
  bytes: 50_000_000,
  lineCharacters: 100_000,
  lines: 200_000,
  columns: 512,
  cells: 2_000_000,
  sheets: 64,
  unpackedBytes: 100_000_000,
} as const

/** How long a worker may read, and how much memory it may take. */
export const WORKER_LIMITS = { timeMs: 20_000, heapMb: 512 } as const
