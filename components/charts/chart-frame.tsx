import { useTranslations } from "next-intl";
import { ScrollFrame } from "@/components/ui/scroll-frame";
import type { ReactNode } from "react";

export type ChartTable = { columns: ReactNode[]; rows: ReactNode[][] };

/** Title and description in words, the drawing, how to read it, and the same data as a table. */
export function ChartFrame({ title, description, how, table, children, id }: { title: string; description: ReactNode; how?: ReactNode; table: ChartTable; children: ReactNode; id: string }) {
  const t = useTranslations("Charts");
  return (
    <figure aria-labelledby={`${id}-title`} className="min-w-0">
      <figcaption>
        <h2 id={`${id}-title`}>{title}</h2>
        <p>{description}</p>
      </figcaption>
      {children}
      {how ? <p className="how max-w-[44rem]">{how}</p> : null}
      <details className="twin mt-2">
        <summary className="sm">{t("showAsTable")}</summary>
        <ScrollFrame labelledBy={`${id}-title`} className="mt-2">
          <table className="head sm">
            <thead>
              <tr>
                {table.columns.map((column, index) => (
                  <th key={index} scope="col">
                    {column}
                  </th>
                ))}
              </tr>
            </thead>
            <tbody>
              {table.rows.map((row, index) => (
                <tr key={index}>
                  {row.map((cell, column) =>
                    column === 0 ? (
                      <th key={column} scope="row">
                        {cell}
                      </th>
                    ) : (
                      <td key={column} className="num">
                        {cell}
                      </td>
                    ),
                  )}
                </tr>
              ))}
            </tbody>
          </table>
        </ScrollFrame>
      </details>
    </figure>
  );
}

/**
 * The wide drawing from 900 px on and the narrow one below it, so that no text ever falls under 12 px. Only one of
 * them is rendered to anybody, assistive technology included.
 */
export const WIDE = "hidden h-auto max-w-full lg:block print:block";
export const NARROW = "block h-auto w-full max-w-[440px] lg:hidden print:hidden";
