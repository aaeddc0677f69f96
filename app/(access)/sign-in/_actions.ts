"use server";
import { cookies, headers } from "next/headers";
import { redirect } from "next/navigation";
import { sessionCookie } from "@/app/(desk)/_lib/session";
import { confirmSignIn, type NewSession, signInForDemonstration } from "@/lib/auth/confirm-sign-in";
import { askedCookieName, SIGN_IN_MINUTES } from "@/lib/auth/constants";
import { requestSignIn } from "@/lib/auth/request-sign-in";
import { ConfirmSignInInput, DemonstrationSignInInput, RequestSignInInput } from "@/lib/auth/schema";
import { newToken } from "@/lib/auth/tokens";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { accessAction } from "../_lib/access-action";
import { accessLocale } from "../_lib/locale";

/** Every request takes this long, so that its time tells nothing about whether an address is known. */
const REQUEST_TAKES_MS = 600;

const https = () => env().EBBMARK_URL.startsWith("https:");
const cookieOptions = () => ({ httpOnly: true, sameSite: "lax" as const, secure: https(), path: "/" });

export const requestSignInAction = accessAction(RequestSignInInput, async (ctx, input) => {
  const began = Date.now();
  const jar = await cookies();
  const name = askedCookieName(https());
  const key = jar.get(name)?.value ?? newToken();
  const network = (await headers()).get("x-forwarded-for")?.split(",")[0]?.trim() ?? "loopback";
  await requestSignIn(ctx, { ...input, locale: await accessLocale() }, { network, key });
  jar.set(name, key, { ...cookieOptions(), maxAge: SIGN_IN_MINUTES * 60 });
  await new Promise((resolve) => setTimeout(resolve, Math.max(0, REQUEST_TAKES_MS - (Date.now() - began))));
  redirect(`/sign-in/sent?lang=${await accessLocale()}`);
});

export const confirmSignInAction = accessAction(ConfirmSignInInput, async (ctx, input) => {
  const jar = await cookies();
  const key = jar.get(askedCookieName(https()))?.value;
  if (!key) throw new DomainError("expired");
  await enter(await confirmSignIn(ctx, input, { key, oldSession: jar.get(sessionCookie())?.value }));
});

export const demonstrationSignInAction = accessAction(DemonstrationSignInInput, async (ctx, input) => {
  // Set by our own server for requests that name a loopback host and came through no proxy.
  if ((await headers()).get("x-ebbmark-direct") !== "1") throw new DomainError("forbidden");
  await enter(await signInForDemonstration(ctx, input, (await cookies()).get(sessionCookie())?.value));
});

async function enter(session: NewSession): Promise<never> {
  const jar = await cookies();
  jar.set(sessionCookie(), session.token, { ...cookieOptions(), expires: session.expires });
  jar.delete(askedCookieName(https()));
  redirect("/desk");
}
