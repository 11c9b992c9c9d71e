/** Runs `work` on all items, so many at a time. The first failure ends it; what runs is waited for. */
export async function inTurn<T>(
  items: readonly T[],
  atOnceCount: number,
  work: (item: T) => Promise<void>,
): Promise<void> {
  let next = 0;
  let failed = false;
  const lane = async (): Promise<void> => {
    while (next < items.length && !failed) {
      const item = items[next]!;
      next += 1;
      try {
        await work(item);
      } catch (error) {
        failed = true;
        throw error;
      }
    }
  };
  const lanes = await Promise.allSettled(Array.from({ length: atOnceCount }, lane));
  const broken = lanes.find((one) => one.status === 'rejected');
  if (broken) throw broken.reason;
}
