/**
 * Gathers calls into groups: one group is under way at a time, and what comes meanwhile makes up the next one.
 * @param run answers one group, in its order
 */
export function inGroups<T, R>(run: (items: T[]) => Promise<R[]>): (item: T) => Promise<R> {
  type Waiting = { item: T; resolve: (result: R) => void; reject: (error: unknown) => void };
  let waiting: Waiting[] = [];
  let busy = false;

  async function flush(): Promise<void> {
    if (busy || waiting.length === 0) return;
    busy = true;
    const group = waiting;
    waiting = [];
    try {
      const results = await run(group.map(({ item }) => item));
      for (const [index, { resolve }] of group.entries()) resolve(results[index] as R);
    } catch (error) {
      for (const { reject } of group) reject(error);
    }
    busy = false;
    void flush();
  }

  return (item) =>
    new Promise<R>((resolve, reject) => {
      waiting.push({ item, resolve, reject });
      queueMicrotask(() => void flush());
    });
}
