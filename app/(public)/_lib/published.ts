import { unstable_cache } from "next/cache";
import { env } from "@/lib/env";
import type { Locale } from "@/lib/i18n/locales";
import { chooseText, newestOfEach } from "@/lib/publications/published";
import * as queries from "@/lib/publications/queries";
import type { Site } from "@/components/public/public-shell";

/** Publishing, correcting and withdrawing expire this tag after they have committed; every page that read it is made anew. */
export const PUBLICATIONS = "publications";
const tags = [PUBLICATIONS];

export const listReleases = unstable_cache(queries.listReleases, ["releases"], { tags });
export const findContent = unstable_cache(queries.findContent, ["content"], { tags });

/** How the newest briefing in this language names the authority; before there is one, its name in the settings. */
export async function findSite(locale: Locale): Promise<Site> {
  const settings = env();
  for (const release of newestOfEach(await listReleases())) {
    if (!release.texts.some((text) => text.locale === locale)) continue;
    const content = await findContent(release.id, locale);
    if (content) return { authority: content.authorityName, lang: locale, contact: content.authorityContact, demonstration: settings.demo || content.demonstration };
  }
  return { authority: settings.AUTHORITY_NAME, lang: "en", contact: settings.AUTHORITY_CONTACT, demonstration: settings.demo };
}

/** The newest release of each briefing with its text in the reader's language, or in the one that stands in for it. */
export async function listCurrent(locale: Locale) {
  const newest = newestOfEach(await listReleases());
  const found = await Promise.all(
    newest.map(async (release) => {
      const text = chooseText(release, locale);
      const content = text ? await findContent(release.id, text.locale) : null;
      return content ? [{ release, content }] : [];
    }),
  );
  return found.flat();
}
