import type { RenderedBriefing, RenderedMeasure } from "@/lib/briefings/rendered";
import { type Axis, fromLeft, labelEvery, percent, placeSpan, scheduleAxis } from "@/lib/charts/public-schedule";
import { formatDay, monthName } from "@/lib/i18n/dates";
import { LOCALES, type Locale } from "@/lib/i18n/locales";
import type { ArticleWords } from "./article-types";

/** What to do, and when: each step with its days in words and as a bar on one axis of months. */
export function Schedule({ content, t }: { content: RenderedBriefing; t: ArticleWords }) {
  const { measures } = content.schedule;
  if (measures.length === 0) return null;
  const axis = scheduleAxis(measures);
  const rtl = LOCALES[content.locale].dir === "rtl";
  return (
    <div className="pstrip">
      <MonthScale axis={axis} locale={content.locale} rtl={rtl} />
      {measures.map((measure, index) => (
        <div key={measure.code} className="m">
          <p>
            {measure.title}
            <small>
              {measure.detail ? `${measure.detail} ` : null}
              {daysInForce(measure, content.locale, t)}
            </small>
          </p>
          <Track axis={axis} measure={measure} rtl={rtl} id={`months-${content.locale}`} first={index === 0} />
        </div>
      ))}
    </div>
  );
}

/** "8 March to 10 October." The year is said where the two differ, and beside the text in the facts. */
function daysInForce({ from, to }: RenderedMeasure, locale: Locale, t: ArticleWords): string {
  if (to === null) return t("schedule.open", { from: formatDay(from, locale) });
  const year = from.slice(0, 4) !== to.slice(0, 4);
  return t("schedule.fromTo", { from: formatDay(from, locale, { year }), to: formatDay(to, locale, { year }) });
}

function MonthScale({ axis, locale, rtl }: { axis: Axis; locale: Locale; rtl: boolean }) {
  const every = labelEvery(axis);
  return (
    <svg className="months" width="100%" height="26" aria-hidden="true">
      {axis.months.map(({ iso, at }, index) => {
        if (index % every !== 0) return null;
        const x = fromLeft({ start: at, size: 0 }, rtl);
        return (
          <g key={iso} className={(index / every) % 2 === 1 ? "hide-s" : undefined}>
            <line x1={x} x2={x} y2="20" />
            <text x={x} dx={rtl ? -5 : 5} y="15">
              {monthName(iso, locale)}
            </text>
          </g>
        );
      })}
    </svg>
  );
}

// The month ticks are drawn once and used by every track: the page stays small.
function Track({ axis, measure, rtl, id, first }: { axis: Axis; measure: RenderedMeasure; rtl: boolean; id: string; first: boolean }) {
  const placed = placeSpan(axis, measure);
  return (
    <svg className="ptrack" width="100%" height="14" aria-hidden="true">
      {first ? (
        <g id={id}>
          <line x2="100%" y1="7" y2="7" />
          {axis.months.map(({ iso, at }) => {
            const x = fromLeft({ start: at, size: 0 }, rtl);
            return <line key={iso} x1={x} x2={x} y2="14" />;
          })}
        </g>
      ) : (
        <use href={`#${id}`} />
      )}
      <rect x={fromLeft(placed, rtl)} width={percent(placed.size)} height="14" rx="2" />
    </svg>
  );
}
