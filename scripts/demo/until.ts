const LOOK_AGAIN_MS = 150;
const PATIENCE_MS = 120_000;

/** Ask until there is an answer. @throws after two minutes, saying what was waited for */
export async function until<T>(what: string, ask: () => Promise<T | null>): Promise<T> {
  const end = Date.now() + PATIENCE_MS;
  for (;;) {
    const answer = await ask();
    if (answer !== null) return answer;
    if (Date.now() > end) throw new Error(`waited two minutes for ${what}`);
    await new Promise((resolve) => setTimeout(resolve, LOOK_AGAIN_MS));
  }
}
