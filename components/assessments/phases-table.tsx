import { useTranslations } from "next-intl";
import { ScrollFrame } from "@/components/ui/scroll-frame";
import { Figure, PackageTile } from "@/components/ui/marks";
import { shownRange } from "@/lib/assessments/figures-of";
import type { AssessmentView } from "@/lib/assessments/view";
import type { Interval } from "@/lib/engine/types";
import { percentShown } from "@/lib/figures/round";
import { useShown } from "./use-shown";

/** What happens between one change of measures and the next: growth at both ends, who is left, and what a lift leaves behind. */
export function PhasesTable({ view }: { view: AssessmentView }) {
  const t = useTranslations("Assessments");
  const shown = useShown(view.outbreak);
  const short = new Map(view.measures.map(({ code, shortName, name }) => [code, shortName || name]));
  const inForce = (letter: string, day: number) =>
    (view.packages.find((each) => each.letter === letter)?.items ?? [])
      .filter(({ startDay, endDay }) => startDay <= day && (endDay === null || endDay > day))
      .map(({ measureCode }) => short.get(measureCode) ?? measureCode);
  const chance = (share: number | null | undefined) => (share === null || share === undefined ? <span className="dim">–</span> : t("phases.chance", percentShown(share)));
  const effective = (drawn: Interval | undefined, central: number) => {
    const range = shownRange(drawn, central);
    return (
      <>
        <Figure {...shown.ratioOf(range)} />
        <small className="mut block">{t("phases.others", { others: shown.ratio(1 / range.mid) })}</small>
      </>
    );
  };
  const infected = (drawn: Interval | undefined, central: number) => <Figure {...shown.count(shownRange(drawn, central))} />;
  return (
    <section aria-labelledby="phases-title" className="min-w-0">
      <h2 id="phases-title" className="!text-[16px] !leading-[23px]">
        {t("phases.title")}
      </h2>
      <p className="sm mut mb-2 max-w-[60rem]">{t("phases.description")}</p>
      <ScrollFrame labelledBy="phases-title">
        <table className="head min-w-[1020px]">
          <thead>
            <tr>
              <th scope="col" className="sticky start-0 z-[1] bg-paper">{t("phases.when")}</th>
              <th scope="col">{t("phases.measures")}</th>
              <th scope="col" className="r">{t("phases.factor")}</th>
              <th scope="col">{t("phases.effectiveStart")}</th>
              <th scope="col">{t("phases.effectiveEnd")}</th>
              <th scope="col" className="r">{t("phases.shrinks")}</th>
              <th scope="col">{t("phases.infected")}</th>
              <th scope="col" className="r">{t("phases.endsByItself")}</th>
            </tr>
          </thead>
          {view.result.packages.map((each) => (
            <tbody key={each.id}>
              <tr className="grp">
                <th scope="rowgroup" colSpan={8} className="!text-[15px] !text-ink">
                  <span className="sticky start-0 inline-flex items-center gap-2">
                    <PackageTile letter={each.id} /> {view.packages.find(({ letter }) => letter === each.id)?.name}
                  </span>
                </th>
              </tr>
              {each.phases.map((phase, index) => {
                const drawn = each.uncertainty?.phases[index];
                const names = inForce(each.id, phase.fromDay);
                return (
                  <tr key={phase.fromDay}>
                    <th scope="row" className="num sticky start-0 z-[1] bg-paper">
                      {phase.toDay === null ? t("phases.fromOn", { from: shown.day(phase.fromDay) }) : t("phases.fromTo", { from: shown.day(phase.fromDay), to: shown.lastDay(phase.toDay) })}
                      {index === each.strongestPhase ? <span className="sm mut block font-normal">{t("phases.strongest")}</span> : null}
                    </th>
                    <td className="sm">{names.length === 0 ? <span className="dim">{t("phases.nothing")}</span> : names.join(", ")}</td>
                    <td className="r num">{shown.ratio(phase.factor)}</td>
                    <td className="num">{effective(drawn?.effectiveRatioAtStart, phase.effectiveRatioAtStart)}</td>
                    <td className="num">{effective(drawn?.effectiveRatioAtEnd, phase.effectiveRatioAtEnd)}</td>
                    <td className="r num">{chance(drawn?.chanceShrinksAtStart)}</td>
                    <td className="num">{phase.toDay === null ? <span className="dim">{t("phases.nobody")}</span> : infected(drawn?.infectedAtEnd, phase.infectedAtEnd)}</td>
                    <td className="r num">{chance(drawn ? drawn.chanceEndsByItself : phase.chanceEndsByItself)}</td>
                  </tr>
                );
              })}
            </tbody>
          ))}
        </table>
      </ScrollFrame>
      <p className="how">{t("phases.how")}</p>
    </section>
  );
}
