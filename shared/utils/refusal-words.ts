/** Said where a request got no answer. */
export const CONNECTION_LOST = 'The server did not answer. Check the connection and try again; what you typed is kept.'

/** Said where the session ended while somebody was typing; the form puts a link to the sign-in page beside it. */
export const SESSION_ENDED = 'Your session has ended. Sign in again, then press the button once more; what you typed is kept.'

/** The body of a refused request, as the server words it. */
export interface Refusal { message?: string, data?: { code?: string, issues?: { path: (string | number)[], message: string }[] } }

/**
 * The sentence for a refused request.
 *
 * @param status HTTP status; undefined when no answer came
 * @param refusal the body, where there is one
 */
export function refusalSentence(status: number | undefined, refusal?: Refusal): string {
  if (status === undefined) return CONNECTION_LOST
  if (status === 401) return SESSION_ENDED
  return refusal?.message || 'This could not be done. Try again.'
}

/** What a refusal says of single fields, by their dotted names. */
export function refusedFields(refusal?: Refusal): Record<string, string> {
  return Object.fromEntries((refusal?.data?.issues ?? []).filter(issue => issue.path.length > 0).map(issue => [issue.path.join('.'), issue.message]))
}
