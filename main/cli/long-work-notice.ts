/** How much of a long piece of work is done, as events of progress tell it. */
export interface WorkDone {
  readonly done: number
  readonly total: number
}

/** The pace is known after so much time. */
const judgedAfter_ms = 1_000
/** Less is not worth a word. */
const longFrom_s = 10

/**
 * Says once, in a plain line, how long work will go on where that is long, from the pace of its first second. It does not ask whether anybody watches: a script that
 * waits without a word looks as if it hung.
 *
 * @param now - in ms
 * @param remedy - what makes it shorter, as a sentence
 */
export function createLongWorkNotice(
  now: () => number,
  say: (line: string) => void,
  what: string,
  remedy: string,
): (work: WorkDone) => void {
  let first: { readonly at_ms: number; readonly done: number } | null = null
  let isJudged = false
  return ({ done, total }) => {
    if (isJudged) return
    const at_ms = now()
    if (first === null) {
      first = { at_ms, done }
      return
    }
    if (at_ms - first.at_ms < judgedAfter_ms || done <= first.done) return
    isJudged = true
    const left_s = ((at_ms - first.at_ms) / 1000) * ((total - done) / (done - first.done))
    if (left_s >= longFrom_s) say(`${what} will take about ${Math.round(left_s)} s more. ${remedy}`)
  }
}
