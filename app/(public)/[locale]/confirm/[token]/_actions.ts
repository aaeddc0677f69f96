"use server";
import { redirect } from "next/navigation";
import { confirmSubscription } from "@/lib/subscribers/confirm-subscription";
import { TRIES_PER_NETWORK } from "@/lib/subscribers/constants";
import { LinkInput } from "@/lib/subscribers/schema";
import { subscriptionToken } from "@/lib/subscribers/token";
import { publicAction } from "../../../_lib/public-action";

export const confirmAction = publicAction(LinkInput, { name: "links", perHour: TRIES_PER_NETWORK }, async (ctx, { token, page }) => {
  const { id } = await confirmSubscription(ctx, token);
  redirect(`/${page}/subscription/${subscriptionToken(id)}?done=confirmed`);
});
