import Link from "next/link";
import { getTranslations } from "next-intl/server";
import { getDeskFormatter } from "@/lib/i18n/desk-formatter";
import { type Level, StateMark } from "@/components/ui/marks";
import { type ChainStatus, getChain } from "@/lib/briefings/chain";

export type Stage = "outbreak" | "measures" | "packages" | "assessment" | "briefing" | "review" | "publication";

type Step = { stage: Stage; level: Level; status: string; href: string | null };

/** The chain of one outbreak: seven stages on a line, each with its level and status; the current one is marked. */
export async function StageLine({ outbreakId, current }: { outbreakId: string; current: Stage }) {
  const chain = await getChain(outbreakId);
  const t = await getTranslations("Desk.chain");
  const format = await getDeskFormatter();
  const day = (date: Date) => format.dateTime(date, { day: "numeric", month: "short" });
  const steps = stepsOf(chain, t, day);
  return (
    <nav className="spine" aria-label={t("label")}>
      <div className="wrap">
        <div className="ob">
          <b>
            {chain.name}, {chain.place}
          </b>
          <span className="dim">{t("residents", { count: chain.populationPersons })}</span>
        </div>
        <ol>
          {steps.map(({ stage, level, status, href }) => (
            <li key={stage} aria-current={stage === current ? "step" : undefined}>
              <StateMark level={level} />
              {href ? <Link href={href}>{t(stage)}</Link> : <span>{t(stage)}</span>}
              <i>{status}</i>
            </li>
          ))}
        </ol>
      </div>
    </nav>
  );
}

type Translate = Awaited<ReturnType<typeof getTranslations<"Desk.chain">>>;

function stepsOf(chain: ChainStatus, t: Translate, day: (date: Date) => string): Step[] {
  const { outbreakId: id, assessment, briefing } = chain;
  const state = briefing?.state;
  const reviewed = state === "approved" || state === "scheduled" || state === "published" || state === "withdrawn" || state === "underCorrection";
  return [
    { stage: "outbreak", level: chain.hasProfile ? "full" : "started", status: chain.hasProfile ? t("profileComplete") : t("profileMissing"), href: `/desk/outbreaks/${id}` },
    { stage: "measures", level: chain.measures > 0 ? "full" : "empty", status: t("inCatalogue", { count: chain.measures }), href: "/desk/measures" },
    { stage: "packages", level: chain.packages > 0 ? "full" : "empty", status: t("toCompare", { count: chain.packages }), href: `/desk/outbreaks/${id}/packages` },
    {
      stage: "assessment",
      level: assessment ? (assessment.frozenAt ? "full" : "half") : "empty",
      status: assessment ? (assessment.frozenAt ? t("assessmentFrozen", { number: String(assessment.number), date: day(assessment.frozenAt) }) : t("assessmentWorking", { number: String(assessment.number) })) : t("notStarted"),
      href: assessment ? `/desk/assessments/${assessment.id}` : `/desk/assessments/new?outbreak=${id}`,
    },
    {
      stage: "briefing",
      level: briefing ? (state === "draft" ? "half" : state === "changesAsked" ? "returned" : "full") : "empty",
      status: briefing ? t("briefingVersion", { number: String(briefing.number), version: String(briefing.versionNumber) }) : t("notStarted"),
      href: briefing ? `/desk/briefings/${briefing.id}` : null,
    },
    {
      stage: "review",
      level: reviewed ? "full" : state === "legalReview" ? "half" : state === "changesAsked" ? "returned" : "empty",
      status: reviewed ? t("reviewSigned") : state === "legalReview" ? t("reviewWaiting") : state === "changesAsked" ? t("reviewReturned") : t("reviewNone"),
      href: briefing ? `/desk/briefings/${briefing.id}/review` : null,
    },
    {
      stage: "publication",
      level: state === "withdrawn" ? "withdrawn" : briefing?.releasedAt ? "full" : "empty",
      status: state === "withdrawn" ? t("withdrawn") : briefing?.releasedAt ? t("published", { date: day(briefing.releasedAt) }) : t("notReleased"),
      href: briefing ? `/desk/briefings/${briefing.id}/publication` : null,
    },
  ];
}
