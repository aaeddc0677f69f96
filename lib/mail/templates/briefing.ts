import type { RenderedBriefing } from "../../briefings/rendered";
import { capitalise } from "../../i18n/capitalise";
import { formatDay, formatTime } from "../../i18n/dates";
import type { Locale } from "../../i18n/locales";
import { translatorOf } from "../../i18n/translator";
import { changedFigures } from "../../publications/changed-figures";
import { cleanLine, type FigureRow, type MailBlock, type MailModel, SINCE, TOKEN } from "../model";
import { cautionLines, SUBJECT_MAX, senderLine } from "./frame";

export type BriefingMail = {
  content: RenderedBriefing;
  release: { number: number; kind: "first" | "update" | "correction"; publishedAt: string };
  /** What was wrong and what it changes; in another language where theirs has none. */
  correction: { lang: Locale; cause: string; effect: string } | null;
  /** The version that a correction corrects, in the same language. */
  before: RenderedBriefing | null;
  /** Public address, without a slash at the end. */
  base: string;
};

/** What a subscriber reads of one release in one language. `TOKEN` and `SINCE` stand for what differs between readers. */
export async function briefingMail({ content, release, correction, before, base }: BriefingMail): Promise<MailModel> {
  const { locale } = content;
  const [t, article] = await Promise.all([translatorOf(locale, "Mail"), translatorOf(locale, "Article")]);
  const day = (iso: string) => formatDay(iso, locale);
  const page = `${base}/${locale}/briefings/${content.slug}`;
  const { measures } = content.schedule;
  return {
    locale,
    subject: cleanLine(release.kind === "first" ? content.title : t(`subject.${release.kind}`, { title: content.title }), SUBJECT_MAX),
    sender: content.authorityName,
    title: content.title,
    meta: await metaLine(content, release),
    blocks: [
      ...(release.kind === "correction" ? await correctionBlocks(content, correction, before) : []),
      ...inShort(content).map((text): MailBlock => ({ kind: "text", text })),
      ...figuresBlock(figureRows(content), [t("figures.figure"), t("figures.value"), t("figures.range")], [t("figures.note"), ...(content.roundingNote ? [article("figures.rounding")] : [])].join(" ")),
      ...(measures.length > 0
        ? [
            {
              kind: "list" as const,
              title: article("parts.whatToDo"),
              items: measures.map(({ title, from, to }) => ({ title, text: to === null ? article("schedule.open", { from: day(from) }) : article("schedule.fromTo", { from: day(from), to: day(to) }) })),
            },
          ]
        : []),
      ...(content.reviewDate ? [{ kind: "text" as const, text: t("review", { day: day(content.reviewDate) }) }] : []),
      { kind: "button", link: { text: t("read"), href: page } },
    ],
    foot: [
      ...(await cautionLines(locale, content.demonstration ? content : null)),
      { text: "", links: [{ text: t("version"), href: `${page}/v/${release.number}` }] },
      ...(await subscriberLines(content, base)),
    ],
  };
}

/** What a subscriber reads when a briefing is withdrawn. */
export async function withdrawalMail({ content, release, notice, base }: Pick<BriefingMail, "content" | "release" | "base"> & { notice: { lang: Locale; text: string } | null }): Promise<MailModel> {
  const { locale } = content;
  const t = await translatorOf(locale, "Mail");
  return {
    locale,
    subject: cleanLine(t("subject.withdrawal", { title: content.title }), SUBJECT_MAX),
    sender: content.authorityName,
    title: content.title,
    meta: await metaLine(content, release),
    blocks: [
      { kind: "notice", lang: locale, lead: t("withdrawal.lead"), texts: [] },
      ...(notice ? [noticeText(notice, locale)] : []),
      { kind: "button", link: { text: t("withdrawal.read"), href: `${base}/${locale}/briefings/${content.slug}` } },
    ],
    foot: [...(await cautionLines(locale, content.demonstration ? content : null)), ...(await subscriberLines(content, base))],
  };
}

const noticeText = ({ lang, text }: { lang: Locale; text: string }, locale: Locale): MailBlock =>
  lang === locale ? { kind: "text", text } : { kind: "notice", lang, lead: text, texts: [] };

async function metaLine(content: RenderedBriefing, { number, publishedAt }: BriefingMail["release"]): Promise<string> {
  const { locale } = content;
  const article = await translatorOf(locale, "Article");
  return [
    article("meta", { illness: capitalise(content.outbreakName, locale), place: content.place, number: String(content.briefingNumber) }),
    article("released", { day: formatDay(publishedAt, locale), time: formatTime(publishedAt) }),
    ...(number > 1 ? [article("version", { number: String(number) })] : []),
  ].join(" · ");
}

async function correctionBlocks(content: RenderedBriefing, correction: BriefingMail["correction"], before: RenderedBriefing | null): Promise<MailBlock[]> {
  const [t, article] = await Promise.all([translatorOf(content.locale, "Mail"), translatorOf(content.locale, "Article")]);
  const rows = before ? changedFigures(before, content) : [];
  // The labels are ours and in the reader's language; the two texts may stand in another one.
  const own = !correction || correction.lang === content.locale;
  return [
    { kind: "notice", lang: content.locale, lead: t("correction.lead"), texts: correction && own ? [t("correction.cause", { text: correction.cause }), t("correction.effect", { text: correction.effect })] : [] },
    ...(correction && !own ? [{ kind: "notice" as const, lang: correction.lang, lead: correction.cause, texts: [correction.effect] }] : []),
    ...(rows.length > 0 ? [{ kind: "changes" as const, title: article("notice.changed"), head: [article("figures.figure"), article("notice.before"), article("notice.now")] as [string, string, string], rows }] : []),
  ];
}

const inShort = (content: RenderedBriefing): string[] =>
  (content.parts.find(({ part }) => part === "inShort")?.paragraphs ?? []).map(({ inlines }) => inlines.map(({ text }) => text).join(""));

const MOST_ROWS = 5;

/** Figures with their interval beside them, deaths first; one without an interval stands by itself. */
export function figureRows({ figures }: RenderedBriefing): FigureRow[] {
  const rows = new Map<string, FigureRow & { deaths: boolean }>();
  for (const { figure, package: letter, form, text, label } of [...figures].sort((a, b) => Number(a.form === "interval") - Number(b.form === "interval"))) {
    const key = `${figure} ${letter}`;
    const row = rows.get(key);
    if (row) {
      if (form === "interval") row.range = text;
    } else if (form === "value") rows.set(key, { label, value: text, range: null, deaths: figure === "finalDeaths" || figure === "deathsAverted" });
  }
  return [...rows.values()]
    .sort((a, b) => Number(b.deaths) - Number(a.deaths))
    .slice(0, MOST_ROWS)
    .map(({ label, value, range }) => ({ label, value, range }));
}

const figuresBlock = (rows: FigureRow[], head: [string, string, string], note: string): MailBlock[] =>
  rows.length === 0 ? [] : [{ kind: "figures", head, rows, note: rows.some(({ range }) => range !== null) ? note : "" }];

/** Who sent it, why it came, how to change or stop it. */
async function subscriberLines(content: RenderedBriefing, base: string) {
  const t = await translatorOf(content.locale, "Mail");
  return [
    await senderLine(content.locale, content.authorityName, content.authorityContact),
    {
      text: t("why", { day: SINCE }),
      links: [
        { text: t("stop"), href: `${base}/u/${TOKEN}` },
        { text: t("manage"), href: `${base}/${content.locale}/subscription/${TOKEN}` },
      ],
    },
  ];
}
