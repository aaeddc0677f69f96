"use server";
import { redirect } from "next/navigation";
import { REQUESTS_PER_NETWORK } from "@/lib/subscribers/constants";
import { requestSubscription } from "@/lib/subscribers/request-subscription";
import { RequestSubscriptionInput } from "@/lib/subscribers/schema";
import { publicAction } from "../../_lib/public-action";

/** The answer is the same whether or not the address is known. */
export const subscribeAction = publicAction(RequestSubscriptionInput, { name: "subscribe", perHour: REQUESTS_PER_NETWORK }, async (ctx, input) => {
  await requestSubscription(ctx, input);
  redirect(`/${input.page}/subscribe/sent`);
});
