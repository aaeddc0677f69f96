import { useTranslations } from "next-intl";
import { ScrollFrame } from "@/components/ui/scroll-frame";
import { PackageTile } from "@/components/ui/marks";
import type { AssessmentView } from "@/lib/assessments/view";
import { useShown } from "./use-shown";

/** Share of each package's shift on the log scale that each measure brings; the shares of a column add up to 100 %. */
export function ContributionsTable({ view }: { view: AssessmentView }) {
  const t = useTranslations("Assessments");
  const shown = useShown(view.outbreak);
  const packages = view.result.packages;
  const share = (id: string, measure: string) => packages.find((each) => each.id === id)?.contributions.find((each) => each.measure === measure);
  return (
    <section aria-labelledby="contributions-title" className="min-w-0">
      <h2 id="contributions-title" className="!text-[16px] !leading-[23px]">
        {t("contributions.title")}
      </h2>
      <p className="sm mut mb-2">{t("contributions.description")}</p>
      <ScrollFrame labelledBy="contributions-title">
        <table className="head">
          <thead>
            <tr>
              <th scope="col">{t("contributions.measure")}</th>
              {packages.map(({ id }) => (
                <th key={id} scope="col" className="r">
                  <PackageTile letter={id} />
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {view.measures.map(({ code, name, shortName }) => (
              <tr key={code}>
                <th scope="row" title={name}>
                  {shortName || name}
                </th>
                {packages.map(({ id }) => {
                  const own = share(id, code);
                  return (
                    <td key={id} className="r num">
                      {own === undefined ? <span className="dim">–</span> : own.logShare === null ? <span className="sm dim">{t("contributions.notThen")}</span> : shown.percent(own.logShare)}
                    </td>
                  );
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </ScrollFrame>
      <p className="how">{t("contributions.how")}</p>
    </section>
  );
}
