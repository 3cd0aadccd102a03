import { methodsOnRequest } from '../../../shared-kinetics/contract/methods-on-request.ts'
import type { MethodId } from '../../../shared-kinetics/contract/study-result.ts'

/**
 * The setting of methods that keeps those worked out now and adds the ones on request: null, all that apply, where none of these is wanted.
 *
 * @param worked - methods that gave a profile
 * @param wanted - methods on request
 */
export function methodsWith(worked: readonly MethodId[], wanted: readonly MethodId[]): MethodId[] | null {
  const onRequest: readonly MethodId[] = methodsOnRequest
  return wanted.length === 0 ? null : [...worked.filter((id) => !onRequest.includes(id)), ...wanted]
}
