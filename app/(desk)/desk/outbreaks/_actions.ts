"use server";
import { revalidatePath } from "next/cache";
import { redirect } from "next/navigation";
import { createOutbreak } from "@/lib/outbreaks/create-outbreak";
import { CreateOutbreakInput, SaveProfileInput, UpdateOutbreakInput } from "@/lib/outbreaks/schema";
import { saveProfile, updateOutbreak } from "@/lib/outbreaks/update-outbreak";
import { staffAction } from "../../_lib/staff-action";

export const createOutbreakAction = staffAction("outbreak:write", CreateOutbreakInput, async (ctx, input) => {
  const { id } = await createOutbreak(ctx, input);
  redirect(`/desk/outbreaks/${id}`);
});

export const updateOutbreakAction = staffAction("outbreak:write", UpdateOutbreakInput, async (ctx, input) => {
  await updateOutbreak(ctx, input);
  revalidatePath(`/desk/outbreaks/${input.id}`);
  redirect(`/desk/outbreaks/${input.id}?saved=facts`);
});

// The command reads the form as it was typed: its schema turns percent into shares and leaves out what doesn't apply.
export const saveProfileAction = staffAction("outbreak:write", SaveProfileInput, async (ctx, input) => {
  await saveProfile(ctx, { ...input, latentPeriodDays: input.latentPeriodDays ?? undefined, exposed: input.exposed ?? undefined });
  revalidatePath(`/desk/outbreaks/${input.id}`);
  redirect(`/desk/outbreaks/${input.id}?saved=profile`);
});
