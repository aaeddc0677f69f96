import { expect, test } from "vitest";
import { taylorStepSource } from "@/lib/engine/generate-taylor-step";

test("the generated Taylor step is what its program writes (vitest -u writes it anew)", async () => {
  await expect(taylorStepSource()).toMatchFileSnapshot("../../../lib/engine/taylor-step.generated.ts");
});
