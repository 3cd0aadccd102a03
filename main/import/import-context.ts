/** What a long import calls at intervals: the first throws `Cancelled` when it is to stop, the second tells how far it is. */
export interface ImportContext {
  checkCancelled(): void
  progress(done: number, total: number): void
}
