import { get } from "node:http";
import { isLocale, LOCALE_CODES, type Locale, SOURCE_LOCALE } from "../i18n/locales";

/**
 * Next draws a page that says "not found" with scripts, which residents' pages don't have. So the ready-made page of
 * each language is fetched when the process starts, and again when public pages are made anew, and sent instead.
 */
export class NotFoundPages {
  private readonly pages = new Map<Locale, string>();

  /** @param origin of this process; @param host the name that it answers for */
  async keep(origin: string, host: string): Promise<void> {
    await Promise.all(
      LOCALE_CODES.map(async (locale) => {
        const page = await read(`${origin}/${locale}/404`, host);
        if (page !== null) this.pages.set(locale, page);
      }),
    );
  }

  /** The page to send instead of an answer that has nothing to read without scripts; undefined where that one will do. */
  instead(status: number, html: string, path: string): string | undefined {
    if (status !== 404 || !html.includes('id="__next_error__"')) return undefined;
    const named = path.split("/")[1];
    return this.pages.get(isLocale(named) ? named : SOURCE_LOCALE);
  }
}

// Not fetch(): it doesn't let a program choose the Host.
function read(url: string, host: string): Promise<string | null> {
  return new Promise((resolve) => {
    get(url, { headers: { host } }, (answer) => {
      const chunks: Buffer[] = [];
      answer.on("data", (chunk: Buffer) => chunks.push(chunk));
      answer.on("end", () => resolve(answer.statusCode === 200 ? Buffer.concat(chunks).toString("utf8") : null));
    }).on("error", () => resolve(null));
  });
}
