"use server";
import { updateTag } from "next/cache";
import { redirect } from "next/navigation";
import { staffAction } from "@/app/(desk)/_lib/staff-action";
import { createBriefing } from "@/lib/briefings/create-briefing";
import { reviewBriefing } from "@/lib/briefings/review-briefing";
import { addFigure, saveBriefingSettings, saveText } from "@/lib/briefings/save-text";
import { AddFigureInput, CreateBriefingInput, PublishBriefingInput, ReviewInput, ReviseBriefingInput, SaveBriefingSettingsInput, SaveTextInput, SubmitBriefingInput, WithdrawBriefingInput } from "@/lib/briefings/schema";
import { submitBriefing } from "@/lib/briefings/submit-briefing";
import { publishBriefing } from "@/lib/publications/publish-briefing";
import { reviseBriefing } from "@/lib/publications/revise-briefing";
import { withdrawBriefing } from "@/lib/publications/withdraw-briefing";

const at = (id: string, rest = "") => `/desk/briefings/${id}${rest}`;

export const createBriefingAction = staffAction("briefing:write", CreateBriefingInput, async (ctx, input) => {
  const { id } = await createBriefing(ctx, input);
  redirect(at(id));
});
export const saveTextAction = staffAction("briefing:write", SaveTextInput, async (ctx, input) => {
  await saveText(ctx, input);
  redirect(at(input.briefingId, `?locale=${input.locale}&saved=1`));
});
export const saveSettingsAction = staffAction("briefing:write", SaveBriefingSettingsInput, async (ctx, input) => {
  await saveBriefingSettings(ctx, { ...input, reviewDate: input.reviewDate ?? undefined });
  redirect(at(input.briefingId, "?saved=1"));
});
export const addFigureAction = staffAction("briefing:write", AddFigureInput, async (ctx, input) => {
  await addFigure(ctx, input);
  redirect(at(input.briefingId, "?saved=1"));
});
export const submitBriefingAction = staffAction("briefing:submit", SubmitBriefingInput, async (ctx, input) => {
  await submitBriefing(ctx, input);
  redirect(at(input.briefingId));
});
export const reviewBriefingAction = staffAction("briefing:review", ReviewInput, async (ctx, input) => {
  await reviewBriefing(ctx, input);
  redirect(at(input.briefingId, "/review"));
});
export const publishBriefingAction = staffAction("briefing:publish", PublishBriefingInput, async (ctx, input) => {
  await publishBriefing(ctx, input);
  updateTag("publications");
  redirect(at(input.briefingId, "/publication"));
});
export const withdrawBriefingAction = staffAction("briefing:withdraw", WithdrawBriefingInput, async (ctx, input) => {
  await withdrawBriefing(ctx, input);
  updateTag("publications");
  redirect(at(input.briefingId, "/publication"));
});
export const reviseBriefingAction = staffAction("briefing:publish", ReviseBriefingInput, async (ctx, input) => {
  await reviseBriefing(ctx, input);
  redirect(at(input.briefingId));
});
