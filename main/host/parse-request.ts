import { requestSchemas, type RequestInput, type RequestName } from '../../shared-kinetics/contract/host-api.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'

/**
 * The input of a request, parsed from something of unknown origin.
 * @throws KineticsError `bad-request` naming the request and the fields that are wrong
 */
export function parseRequest<Name extends RequestName>(name: Name, value: unknown): RequestInput<Name> {
  const parsed = requestSchemas[name].safeParse(value)
  if (parsed.success) return parsed.data as RequestInput<Name>
  const fields = parsed.error.issues.slice(0, 5).map((issue) => `${issue.path.map(String).join('.') || 'the whole'} (${issue.message})`)
  throw new KineticsError('bad-request', `The request ${name} is not as it should be: ${fields.join('; ')}.`, { request: name })
}

/** @throws KineticsError `bad-request` for a name no handler answers */
export function checkRequestName(name: string): RequestName {
  if (Object.hasOwn(requestSchemas, name)) return name as RequestName
  throw new KineticsError('bad-request', `There is no request named ${name.slice(0, 80)}.`)
}
