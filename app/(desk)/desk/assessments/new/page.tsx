import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { EmptyState, PageHead } from "@/components/desk/page-parts";
import { ButtonLink } from "@/components/ui/button";
import { DRAWS_DEFAULT, HORIZON_DAYS_DEFAULT } from "@/lib/assessments/constants";
import { readSources } from "@/lib/assessments/queries";
import { DomainError } from "@/lib/errors";
import { requireStaff } from "../../../_lib/session";
import { StageLine } from "../../../_lib/stage-line";
import { notFound } from "next/navigation";
import { CreateAssessmentForm } from "../_create-form";

export async function generateMetadata(): Promise<Metadata> {
  return { title: (await getTranslations("Assessments"))("create.title") };
}

/** What an assessment of this outbreak could be made from; "notReady" where the outbreak isn't described yet. */
async function sourcesOf(outbreakId: string) {
  try {
    return await readSources(outbreakId);
  } catch (error) {
    if (error instanceof DomainError && error.code === "notReady") return "notReady";
    if (error instanceof DomainError && error.code === "notFound") notFound();
    throw error;
  }
}

export default async function NewAssessmentPage({ searchParams }: { searchParams: Promise<{ outbreak?: string }> }) {
  await requireStaff("assessment:write");
  const { outbreak: outbreakId } = await searchParams;
  const t = await getTranslations("Assessments");
  if (!outbreakId) {
    return (
      <main id="main" className="wrap">
        <PageHead title={t("create.title")} />
        <EmptyState title={t("create.chooseOutbreak")} action={<ButtonLink look="primary" href="/desk/outbreaks">{t("list.emptyAction")}</ButtonLink>}>
          {t("create.chooseOutbreakText")}
        </EmptyState>
      </main>
    );
  }
  const sources = await sourcesOf(outbreakId);
  const missing =
    sources === "notReady"
      ? { text: t("create.profileMissing"), href: `/desk/outbreaks/${outbreakId}`, action: t("create.toProfile") }
      : sources.packages.length === 0
        ? { text: t("create.noPackages"), href: `/desk/outbreaks/${outbreakId}/packages`, action: t("create.toPackages") }
        : null;
  return (
    <>
      <StageLine outbreakId={outbreakId} current="assessment" />
      <main id="main" className="wrap">
        <PageHead title={t("create.title")} {...(sources === "notReady" ? {} : { lede: t("create.lede", { name: sources.outbreak.name, place: sources.outbreak.place }) })} />
        {missing || sources === "notReady" ? (
          <div className="mt-6">
            <EmptyState title={t("create.notReady")} action={missing ? <ButtonLink look="primary" href={missing.href}>{missing.action}</ButtonLink> : null}>
              {missing?.text}
            </EmptyState>
          </div>
        ) : (
          <CreateAssessmentForm
            packages={sources.packages.slice(0, 8).map(({ letter, name, items }) => ({ letter, name, empty: items.length === 0 }))}
            defaults={{
              outbreakId,
              title: t("fields.titleDefault", { count: Math.min(8, sources.packages.filter(({ items }) => items.length > 0).length) }),
              // Day 0 as a number: easy to recognise, and the same for everybody.
              seed: Number(sources.outbreak.dayZero.replaceAll("-", "")),
              draws: DRAWS_DEFAULT,
              horizonDays: HORIZON_DAYS_DEFAULT,
            }}
          />
        )}
      </main>
    </>
  );
}
