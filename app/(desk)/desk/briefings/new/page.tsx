import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { EmptyState, PageHead } from "@/components/desk/page-parts";
import { getFrozen, listAssessments } from "@/lib/assessments/queries";
import { CreateForm } from "../_small-forms";

export const metadata: Metadata = { title: "New briefing" };

export default async function NewBriefingPage({ searchParams }: { searchParams: Promise<{ assessment?: string | string[] }> }) {
  await requireStaff("briefing:write");
  const { assessment } = await searchParams;
  const t = await getTranslations("Briefings");
  const frozen = (await listAssessments()).filter((row) => row.frozenAt !== null);
  const shown = typeof assessment === "string" ? frozen.filter(({ id }) => id === assessment) : frozen;
  // One record that can't be read (an older context, say) must not take the others away.
  const read = await Promise.allSettled((shown.length ? shown : frozen).slice(0, 10).map(({ id }) => getFrozen(id)));
  const whole = read.flatMap((each) => (each.status === "fulfilled" ? [each.value] : []));
  return (
    <main id="main" className="wrap">
      <PageHead title={t("newTitle")} lede={t("newLede")} />
      {whole.length === 0 ? (
        <EmptyState title={t("noneFrozen")}>{t("noneFrozenText")}</EmptyState>
      ) : (
        <div className="mt-6 grid max-w-[720px] gap-8">
          {whole.map(({ assessmentId, number, title, context }) => (
            <CreateForm key={assessmentId} assessmentId={assessmentId} heading={t("assessment", { number: String(number), title })} packages={context.packages.map(({ letter, name }) => ({ letter, name }))} />
          ))}
        </div>
      )}
    </main>
  );
}
