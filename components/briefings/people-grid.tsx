import { GRID, GRID_DASHES, gridPath, peopleGrid } from "@/lib/charts/people-grid";
import type { PeopleShare, RenderedBriefing } from "@/lib/briefings/rendered";
import { LOCALES } from "@/lib/i18n/locales";
import type { ArticleWords } from "./article-types";

/** Of 1,000 residents, without and with the steps: infections and deaths together. */
export function PeopleGrids({ content, t }: { content: RenderedBriefing; t: ArticleWords }) {
  if (!content.people) return null;
  const rtl = LOCALES[content.locale].dir === "rtl";
  return (
    <>
      <p className="col">{t("people.lead")}</p>
      <div className="people">
        <Grid title={t("people.without")} share={content.people.without} rtl={rtl} t={t} />
        <Grid title={t("people.with")} share={content.people.with} rtl={rtl} t={t} />
      </div>
      <p className="key">
        {(["rest", "recovered", "died"] as const).map((key) => (
          <span key={key}>
            <i className={`sq-${key}`} />
            {t(`people.key.${key}`)}
          </span>
        ))}
      </p>
    </>
  );
}

function Grid({ title, share, rtl, t }: { title: string; share: PeopleShare; rtl: boolean; t: ArticleWords }) {
  const grid = peopleGrid(share);
  const sentence = t("people.sentence", { infected: share.infected, died: share.died });
  return (
    <div>
      <h3>{title}</h3>
      <p>{sentence}</p>
      <svg viewBox={`0 0 ${GRID.width} ${GRID.height}`} role="img" aria-label={`${title}: ${sentence}`} strokeWidth={GRID.square} strokeDasharray={GRID_DASHES}>
        {(["rest", "recovered", "died"] as const).map((key) => (
          <path key={key} className={`sq-${key}`} d={gridPath(grid[key], rtl)} />
        ))}
      </svg>
    </div>
  );
}
