/** Asks again until the answer fits; for what a job does in the background. Fails with the last answer. */
export async function eventually<T>(ask: () => Promise<T>, fits: (answer: T) => boolean, timeoutMs = 20_000): Promise<T> {
  const end = Date.now() + timeoutMs
  for (;;) {
    const answer = await ask()
    if (fits(answer)) return answer
    if (Date.now() > end) throw new Error(`still not after ${timeoutMs} ms: ${JSON.stringify(answer).slice(0, 500)}`)
    await new Promise(resolve => setTimeout(resolve, 200))
  }
}
