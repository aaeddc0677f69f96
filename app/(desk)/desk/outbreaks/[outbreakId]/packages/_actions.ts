"use server";
import { revalidatePath } from "next/cache";
import { redirect } from "next/navigation";
import { staffAction } from "@/app/(desk)/_lib/staff-action";
import { createPackage } from "@/lib/packages/create-package";
import { deletePackage } from "@/lib/packages/delete-package";
import { getPackage } from "@/lib/packages/queries";
import { CreatePackageInput, DeletePackageInput, UpdatePackageInput } from "@/lib/packages/schema";
import { updatePackage } from "@/lib/packages/update-package";
import { typedPackage } from "./_typed-package";

export const createPackageAction = staffAction("package:write", CreatePackageInput, async (ctx, input) => {
  const { id } = await createPackage(ctx, input);
  redirect(`/desk/outbreaks/${input.outbreakId}/packages/${id}`);
});

export const updatePackageAction = staffAction("package:write", UpdatePackageInput, async (ctx, input) => {
  await updatePackage(ctx, typedPackage(input));
  const { outbreakId } = await getPackage(input.id);
  revalidatePath(`/desk/outbreaks/${outbreakId}/packages`);
  redirect(`/desk/outbreaks/${outbreakId}/packages/${input.id}?saved=1`);
});

export const deletePackageAction = staffAction("package:write", DeletePackageInput, async (ctx, input) => {
  const { outbreakId } = await deletePackage(ctx, input);
  redirect(`/desk/outbreaks/${outbreakId}/packages`);
});
