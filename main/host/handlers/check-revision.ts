import { KineticsError } from '../../../shared-kinetics/errors.ts'
import type { Workspace } from '../workspace.ts'

/** @throws KineticsError `revision-conflict` where the page saw another revision than the one that is open */
export function checkRevision(workspace: Workspace, seen: number): void {
  const current = workspace.session.revision
  if (seen === current) return
  throw new KineticsError('revision-conflict', 'The study has changed since this page last saw it. Read it again.', { seen, current })
}
