type Answer = 'granted' | 'refused' | 'unknown';

/** Whether the browser promises not to clear the readings by itself. */
export async function persistence(): Promise<Answer> {
  return answerOf(() => navigator.storage?.persisted?.());
}

/** Ask for that promise: after the first saved reading, because browsers answer by how the site is used. */
export async function askPersistence(): Promise<Answer> {
  return answerOf(() => navigator.storage?.persist?.());
}

async function answerOf(ask: () => Promise<boolean> | undefined): Promise<Answer> {
  try {
    const answer = await ask();
    return answer === undefined ? 'unknown' : answer ? 'granted' : 'refused';
  } catch {
    return 'unknown';
  }
}

/** Bytes that this site uses. The quota beside it is invented by browsers and not shown. */
export async function usageBytes(): Promise<number | undefined> {
  try {
    return (await navigator.storage?.estimate?.())?.usage;
  } catch {
    return undefined;
  }
}
