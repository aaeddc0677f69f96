"use client";
import type { FieldMetadata } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { PackageTile } from "@/components/ui/marks";

/** One box per package of the outbreak; plain checkboxes of one name, so that they post without a script. */
export function PackageChoice({ meta, packages, chosen, errors }: { meta: FieldMetadata<unknown>; packages: { letter: string; name: string; empty: boolean }[]; chosen: string[]; errors?: string[] | undefined }) {
  const t = useTranslations("Assessments");
  const shown = errors ?? meta.errors;
  return (
    <fieldset id={meta.id} tabIndex={-1} aria-describedby={shown?.length ? `${meta.id}-error` : `${meta.id}-hint`}>
      <legend className="lab">{t("fields.packages")}</legend>
      <p id={`${meta.id}-hint`} className="hint mb-2">
        {t("fields.packagesHint")}
      </p>
      <div className="flex flex-wrap gap-x-8 gap-y-1">
        {packages.map(({ letter, name, empty }) => (
          <label key={letter} className="flex min-h-[44px] items-center gap-3 !text-[15px] !font-normal">
            <input type="checkbox" name={meta.name} value={letter} defaultChecked={chosen.includes(letter)} />
            <PackageTile letter={letter} />
            <span>
              {name} {empty ? <span className="sm dim">{t("fields.empty")}</span> : null}
            </span>
          </label>
        ))}
      </div>
      {shown?.length ? (
        <p id={`${meta.id}-error`} className="ferr">
          {shown.join(" ")}
        </p>
      ) : null}
    </fieldset>
  );
}
