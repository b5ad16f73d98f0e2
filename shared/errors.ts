/** What kind of refusal a DomainError is; the HTTP status it maps to is known only to `define-api.ts`. */
export type DomainErrorCode = 'not-found' | 'not-allowed' | 'conflict' | 'invalid' | 'too-many' | 'unavailable'

/**
 * A refusal by a rule of the domain: what is wrong, where, and what to do. Free of HTTP.
 *
 * @example throw new DomainError('conflict', 'Another run holds these days. Choose other days.', ['slot'])
 */
export class DomainError extends Error {
  constructor(
    readonly code: DomainErrorCode,
    message: string,
    readonly path: (string | number)[] = [],
  ) {
    super(message)
    this.name = 'DomainError'
  }
}
