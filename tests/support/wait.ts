/**
 * Asks again and again until there is an answer.
 *
 * @param what  for the error when there is none after `patience` milliseconds
 */
export async function eventually<T>(
  what: string,
  ask: () => Promise<T | undefined>,
  patience = 30_000,
): Promise<T> {
  const until = performance.now() + patience;
  do {
    const answer = await ask();
    if (answer !== undefined) return answer;
    await new Promise((resolve) => setTimeout(resolve, 100));
  } while (performance.now() < until);
  throw new Error(`Waited ${patience / 1000} s in vain for ${what}.`);
}
