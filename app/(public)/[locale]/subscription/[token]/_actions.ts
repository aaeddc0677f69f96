"use server";
import { redirect } from "next/navigation";
import { changeSubscription } from "@/lib/subscribers/change-subscription";
import { TRIES_PER_NETWORK } from "@/lib/subscribers/constants";
import { leaveSubscription } from "@/lib/subscribers/leave-subscription";
import { ChangeSubscriptionInput, LinkInput } from "@/lib/subscribers/schema";
import { undoLeaving } from "@/lib/subscribers/undo-leaving";
import { publicAction } from "../../../_lib/public-action";

const limit = { name: "links", perHour: TRIES_PER_NETWORK };

export const changeAction = publicAction(ChangeSubscriptionInput, limit, async (ctx, input) => {
  await changeSubscription(ctx, input);
  redirect(`/${input.page}/subscription/${encodeURIComponent(input.token)}?done=changed`);
});

// Leaving is never refused for having been tried often.
export const leaveAction = publicAction(LinkInput, { name: "leave", perHour: Number.MAX_SAFE_INTEGER }, async (ctx, { token, page }) => {
  await leaveSubscription(ctx, token, "link");
  redirect(`/${page}/subscription/${encodeURIComponent(token)}`);
});

export const undoAction = publicAction(LinkInput, limit, async (ctx, { token, page }) => {
  await undoLeaving(ctx, token);
  redirect(`/${page}/subscription/${encodeURIComponent(token)}?done=undone`);
});
