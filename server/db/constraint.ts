/**
 * The name of the constraint that refused a statement.
 *
 * @param error as thrown by drizzle, which wraps the driver's
 * @returns the constraint's name, or undefined when something else went wrong
 */
export function constraintOf(error: unknown): string | undefined {
  for (let current = error; current instanceof Error; current = current.cause) {
    if ('constraint' in current && typeof current.constraint === 'string') return current.constraint
  }
  return undefined
}
