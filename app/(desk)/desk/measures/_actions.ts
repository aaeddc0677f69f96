"use server";
import { revalidatePath } from "next/cache";
import { redirect } from "next/navigation";
import { archiveMeasure } from "@/lib/measures/archive-measure";
import { createMeasure } from "@/lib/measures/create-measure";
import { ArchiveMeasureInput, CreateMeasureInput, UpdateMeasureInput } from "@/lib/measures/schema";
import { updateMeasure } from "@/lib/measures/update-measure";
import { staffAction } from "../../_lib/staff-action";
import { typedMeasure } from "./_typed-measure";

export const createMeasureAction = staffAction("measure:write", CreateMeasureInput, async (ctx, input) => {
  await createMeasure(ctx, typedMeasure(input));
  revalidatePath("/desk/measures");
  redirect("/desk/measures");
});

export const updateMeasureAction = staffAction("measure:write", UpdateMeasureInput, async (ctx, input) => {
  await updateMeasure(ctx, { ...typedMeasure(input), id: input.id, version: input.version });
  revalidatePath("/desk/measures");
  redirect(`/desk/measures/${input.id}?saved=1`);
});

export const archiveMeasureAction = staffAction("measure:write", ArchiveMeasureInput, async (ctx, input) => {
  await archiveMeasure(ctx, input);
  revalidatePath("/desk/measures");
  redirect("/desk/measures");
});
