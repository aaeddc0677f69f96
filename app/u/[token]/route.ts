import { createTranslator } from "use-intl/core";
import { plainPage } from "@/components/public/plain-page";
import { LOCALES, type Locale, SOURCE_LOCALE } from "@/lib/i18n/locales";
import { loadMessages } from "@/lib/i18n/messages";
import { leaveSubscription } from "@/lib/subscribers/leave-subscription";
import { findSubscription } from "@/lib/subscribers/queries";
import { readSubscriptionToken } from "@/lib/subscribers/token";

type Params = { params: Promise<{ token: string }> };

export const dynamic = "force-dynamic";

/** Shows a button and does nothing: mail programs and scanners open links too. */
export async function GET(_request: Request, { params }: Params): Promise<Response> {
  const { token } = await params;
  const { locale, t } = await wordsFor(token);
  if (!readSubscriptionToken(token)) return html(404, page(locale, t("title"), t("unknown"), token, t, false));
  return html(200, page(locale, t("title"), t("lead"), token, t, true));
}

/**
 * One-click unsubscribe (RFC 8058): from mail programs, without cookie or origin, in either form encoding. Answers 200
 * in plain text without redirect, again and again. A person who pressed the button on our page gets a page.
 */
export async function POST(request: Request, { params }: Params): Promise<Response> {
  const { token } = await params;
  const { locale, t } = await wordsFor(token);
  const known = readSubscriptionToken(token) !== null;
  if (known) {
    const requestId = request.headers.get("x-request-id") ?? crypto.randomUUID();
    await leaveSubscription({ actor: { kind: "visitor" }, now: new Date(), requestId }, token, "oneClick");
  }
  const sentence = t(known ? "done" : "unknown");
  const status = known ? 200 : 404;
  if (await isFromOurPage(request)) return html(status, page(locale, t("title"), sentence, token, t, false));
  return new Response(`${sentence}\n`, { status, headers: { "Content-Type": "text/plain; charset=utf-8", "Content-Language": locale, "Cache-Control": "no-store" } });
}

async function wordsFor(token: string) {
  const locale = (await findSubscription(token, new Date()))?.locale ?? SOURCE_LOCALE;
  return { locale, t: createTranslator({ locale, messages: await loadMessages(locale), namespace: "Subscribe.oneClick" }) };
}

// A body that can't be read is no reason to keep somebody on the list, so it only decides how the answer looks.
async function isFromOurPage(request: Request): Promise<boolean> {
  if (Number(request.headers.get("content-length") ?? 0) > 4096) return false;
  const form = await request.formData().catch(() => null);
  return form?.get("from") === "page";
}

type Words = Awaited<ReturnType<typeof wordsFor>>["t"];

const page = (locale: Locale, title: string, sentence: string, token: string, t: Words, button: boolean): string =>
  plainPage({
    locale,
    dir: LOCALES[locale].dir,
    title,
    sentence,
    form: button ? { action: `/u/${token}`, button: t("button") } : null,
    links: [
      { href: `/${locale}/subscription/${token}`, text: t("manage") },
      { href: `/${locale}`, text: t("home") },
    ],
  });

const html = (status: number, body: string): Response =>
  new Response(body, { status, headers: { "Content-Type": "text/html; charset=utf-8", "Cache-Control": "no-store", "X-Robots-Tag": "noindex" } });
