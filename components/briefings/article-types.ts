import type { getTranslations } from "next-intl/server";
import type { Locale } from "@/lib/i18n/locales";

/** Words of the article in the language of its text. */
export type ArticleWords = Awaited<ReturnType<typeof getTranslations<"Article">>>;

/** What residents are told about a release, in the first language of theirs that there is. */
export type NoticeText = { text: string; lang: Locale };
export type ChangedFigure = { label: string; before: string; now: string };

export type ArticleNotice =
  | { kind: "withdrawn"; at: string; text: NoticeText | null }
  | { kind: "corrected"; at: string; cause: NoticeText | null; effect: NoticeText | null; earlierHref: string | null; changed: ChangedFigure[] }
  /** An earlier version: `corrected` says that it held a mistake, otherwise a newer one took its place. */
  | { kind: "outdated"; at: string; corrected: boolean; newestHref: string };

export type ArticleRelease = {
  /** Moment of publication, ISO. */
  publishedAt: string;
  /** Counted per briefing: 1 is the first release. */
  number: number;
  /** SHA-256 of the frozen assessment's result. */
  assessmentHash: string;
  /** Newest first; `href` null for the one shown. */
  versions: { number: number; kind: "first" | "update" | "correction"; publishedAt: string; href: string | null }[];
  methodHref: string;
  subscribeHref: string;
};
