/** How much is at work at once: one for each worker. */
const lanes = 2

/**
 * Begins one piece of work after the other, two at once, until there is none left. The next goes to the pool only when one is done, behind whatever else has come to wait there.
 * @param next - begins the next piece; null: none is left
 * @throws what the first piece that failed threw; no more are begun then
 */
export async function inLanes(next: () => Promise<void> | null): Promise<void> {
  let failed = false
  const lane = async (): Promise<void> => {
    while (!failed) {
      try {
        const work = next()
        if (work === null) return
        await work
      } catch (error) {
        failed = true
        throw error
      }
    }
  }
  await Promise.all(Array.from({ length: lanes }, lane))
}
