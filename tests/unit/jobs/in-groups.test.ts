import { expect, test } from "vitest";
import { inGroups } from "@/lib/jobs/in-groups";

const tick = () => new Promise<void>((resolve) => setTimeout(resolve, 5));

test("one group is under way at a time; what comes meanwhile makes up the next", async () => {
  const groups: number[][] = [];
  let under = 0;
  const double = inGroups<number, number>(async (items) => {
    under += 1;
    expect(under).toBe(1);
    groups.push(items);
    await tick();
    under -= 1;
    return items.map((item) => item * 2);
  });
  const first = double(1);
  await Promise.resolve();
  const rest = [double(2), double(3)];
  expect(await Promise.all([first, ...rest])).toEqual([2, 4, 6]);
  expect(groups).toEqual([[1], [2, 3]]);
});

test("a group that fails fails its callers and nobody else", async () => {
  let calls = 0;
  const run = inGroups<number, number>(async (items) => {
    calls += 1;
    await tick();
    if (items.includes(1)) throw new Error("broken");
    return items;
  });
  const first = run(1);
  await Promise.resolve();
  const second = run(2);
  await expect(first).rejects.toThrow("broken");
  expect(await second).toBe(2);
  expect(calls).toBe(2);
});
