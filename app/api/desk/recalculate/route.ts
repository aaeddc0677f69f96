import { parseWithZod } from "@conform-to/zod/v4";
import { chartWords } from "@/app/(desk)/_lib/assessment-words";
import { findStaff, staffCtx } from "@/app/(desk)/_lib/session";
import { requireSameOrigin } from "@/app/(desk)/_lib/staff-action";
import { currentResult } from "@/lib/assessments/current-result";
import { prepareEdit } from "@/lib/assessments/prepare-edit";
import { placeOf, type RecalculationLine, type RecalculationRefusal } from "@/lib/assessments/recalculation";
import { EditAssessmentInput } from "@/lib/assessments/schema";
import { buildView } from "@/lib/assessments/view";
import { ComputeError } from "@/lib/compute/outcome";
import { DomainError, type DomainErrorCode } from "@/lib/errors";

const STATUS: Partial<Record<DomainErrorCode, number>> = { signedOut: 401, forbidden: 403, notFound: 404, conflict: 409, frozen: 409, notReady: 409 };

function refuse(body: RecalculationRefusal, status: number): Response {
  return Response.json(body, { status, headers: { "Cache-Control": "no-store" } });
}

/** Figures for changes that aren't saved: the edit form as it stands in, one JSON line per step of the work out. */
export async function POST(request: Request): Promise<Response> {
  try {
    await requireSameOrigin();
    const actor = await findStaff();
    if (!actor) throw new DomainError("signedOut");
    const submission = parseWithZod(await request.formData(), { schema: EditAssessmentInput });
    if (submission.status !== "success") return refuse({ kind: "invalid", error: submission.reply().error ?? {} }, 422);
    const prepared = await prepareEdit(await staffCtx(actor), submission.value);
    return stream(request.signal, prepared, await chartWords());
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
    const code = error.code as (RecalculationRefusal & { kind: "stopped" })["code"];
    return refuse({ kind: "stopped", code }, STATUS[error.code] ?? 400);
  }
}

function stream(requestSignal: AbortSignal, { input, context }: Awaited<ReturnType<typeof prepareEdit>>, words: Awaited<ReturnType<typeof chartWords>>): Response {
  // Ended by the reader's going away or by a newer request: both end the worker's thread.
  const left = new AbortController();
  const signal = AbortSignal.any([requestSignal, left.signal]);
  const encoder = new TextEncoder();
  const body = new ReadableStream<Uint8Array>({
    async start(controller) {
      const say = (line: RecalculationLine) => {
        if (!signal.aborted) controller.enqueue(encoder.encode(`${JSON.stringify(line)}\n`));
      };
      try {
        const result = await currentResult(input, { signal, onProgress: (share) => say({ kind: "progress", share }) });
        say({ kind: "view", view: buildView(input, result, context, words), horizonDays: input.horizonDays ?? 0 });
      } catch (error) {
        if (!(error instanceof ComputeError)) {
          controller.error(error);
          return;
        }
        if (error.code === "refused") say({ kind: "refused", faults: error.faults.map(({ path, message }) => ({ ...placeOf(path, input), message })) });
        else say({ kind: "failed", code: error.code });
      }
      if (!left.signal.aborted) controller.close();
    },
    cancel() {
      left.abort();
    },
  });
  return new Response(body, { headers: { "Content-Type": "application/x-ndjson; charset=utf-8", "Cache-Control": "no-store" } });
}
