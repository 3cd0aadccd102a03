/** The host did not answer at all: its process has ended, or the page is older than the host. Told apart from answers that say no. */
export class HostUnreachable extends Error {
  override readonly name = 'HostUnreachable'
}
