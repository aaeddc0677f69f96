"use server";
import { revalidatePath } from "next/cache";
import { redirect } from "next/navigation";
import { createAssessment } from "@/lib/assessments/create-assessment";
import { freezeAssessment } from "@/lib/assessments/freeze-assessment";
import { CreateAssessmentInput, EditAssessmentInput, FreezeAssessmentInput } from "@/lib/assessments/schema";
import { updateAssessment } from "@/lib/assessments/update-assessment";
import { staffAction } from "../../_lib/staff-action";

export const createAssessmentAction = staffAction("assessment:write", CreateAssessmentInput, async (ctx, input) => {
  const { id } = await createAssessment(ctx, input);
  redirect(`/desk/assessments/${id}`);
});

export const saveAssessmentAction = staffAction("assessment:write", EditAssessmentInput, async (ctx, input) => {
  const { id } = await updateAssessment(ctx, input);
  revalidatePath(`/desk/assessments/${id}`);
  redirect(`/desk/assessments/${id}?saved=1`);
});

export const freezeAssessmentAction = staffAction("assessment:freeze", FreezeAssessmentInput, async (ctx, input) => {
  const { id } = await freezeAssessment(ctx, input);
  revalidatePath(`/desk/assessments/${id}`);
  redirect(`/desk/assessments/${id}`);
});
