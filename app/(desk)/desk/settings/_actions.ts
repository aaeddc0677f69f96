"use server";
import { cookies } from "next/headers";
import { redirect } from "next/navigation";
import { sessionCookie } from "@/app/(desk)/_lib/session";
import { staffAction } from "@/app/(desk)/_lib/staff-action";
import { changeRole } from "@/lib/users/change-role";
import { deactivateUser } from "@/lib/users/deactivate-user";
import { endOtherSessions } from "@/lib/users/end-sessions";
import { inviteUser } from "@/lib/users/invite-user";
import { ChangeRoleInput, DeactivateUserInput, EndSessionsInput, InviteUserInput } from "@/lib/users/schema";

export const inviteUserAction = staffAction("user:manage", InviteUserInput, async (ctx, input) => {
  await inviteUser(ctx, input);
  redirect("/desk/settings");
});

export const changeRoleAction = staffAction("user:manage", ChangeRoleInput, async (ctx, input) => {
  await changeRole(ctx, input);
  redirect("/desk/settings");
});

export const deactivateUserAction = staffAction("user:manage", DeactivateUserInput, async (ctx, input) => {
  await deactivateUser(ctx, input);
  redirect("/desk/settings");
});

export const endOtherSessionsAction = staffAction("desk:read", EndSessionsInput, async (ctx) => {
  await endOtherSessions(ctx, (await cookies()).get(sessionCookie())?.value ?? "");
  redirect("/desk/settings");
});
