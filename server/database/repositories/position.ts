/** Where a page of a list goes on; the id decides between equals. */
export interface TimePosition {
  at: Date
  id: string
}

export interface NamePosition {
  name: string
  id: string
}
