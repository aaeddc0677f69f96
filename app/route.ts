import { negotiateLocale } from "@/lib/i18n/negotiate";

/** Sends a reader without a language to one that their browser asks for; the address remembers it, nothing else does. */
export function GET(request: Request): Response {
  const locale = negotiateLocale(request.headers.get("accept-language"));
  return new Response(null, { status: 307, headers: { Location: `/${locale}`, Vary: "Accept-Language", "Cache-Control": "no-store" } });
}
