"use client";
import { useForm } from "@conform-to/react";
import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { useTranslations } from "next-intl";
import { useActionState, useEffect, useRef, useState } from "react";
import { AssessmentResultView } from "@/components/assessments/assessment-result";
import { FindingLede } from "@/components/assessments/finding-lede";
import { Button } from "@/components/ui/button";
import type { PlacedFault } from "@/lib/assessments/recalculation";
import type { EditAssessmentInput } from "@/lib/assessments/schema";
import type { AssessmentView } from "@/lib/assessments/view";
import { saveAssessmentAction } from "./_actions";
import type { EditablePackage } from "./_edit-fields";
import { EditPanel } from "./_edit-panel";
import { FreezeForm, type FreezeProps } from "./_freeze-form";
import { useRecalculation } from "./_use-recalculation";

export type WorkingProps = {
  id: string;
  outbreak: { dayZero: string; currency: string };
  /** null where the stored state can't be calculated; the page says why. */
  saved: { view: AssessmentView; horizonDays: number } | null;
  defaults: Record<string, unknown>;
  packages: EditablePackage[];
  freeze: FreezeProps;
};

/** Works as plain forms without a script; with one, the figures follow what is typed. */
export function WorkingAssessment(props: WorkingProps) {
  const [client] = useState(() => new QueryClient({ defaultOptions: { queries: { retry: false, refetchOnWindowFocus: false, refetchOnReconnect: false, staleTime: Number.POSITIVE_INFINITY, gcTime: 60_000 } } }));
  // Discarding starts anew from what is stored: form, messages and figures.
  const [round, setRound] = useState(0);
  return (
    <QueryClientProvider client={client}>
      <Editor key={round} {...props} opened={round > 0} onDiscard={() => setRound(round + 1)} />
    </QueryClientProvider>
  );
}

function Editor({ id, outbreak, saved, defaults, packages, freeze, opened, onDiscard }: WorkingProps & { opened: boolean; onDiscard: () => void }) {
  const t = useTranslations("Assessments");
  const formRef = useRef<HTMLFormElement>(null);
  const [scripted, setScripted] = useState(false);
  const [lastResult, action, saving] = useActionState(saveAssessmentAction, undefined);
  const [form, fields] = useForm<EditAssessmentInput>({ id: "edit", lastResult: lastResult ?? null, defaultValue: defaults as never });
  const live = useRecalculation(id, saved ? { kind: "view", ...saved } : null);
  useEffect(() => {
    setScripted(true);
    if (formRef.current) live.begin(formRef.current);
  });
  const { outcome, shown } = live;
  const stale = live.edited && (live.working || live.cancelled || live.lost || outcome?.kind !== "view");
  const status = statusOf(t, live, outcome);
  return (
    <>
      <div className={stale ? "opacity-60" : undefined}>{shown ? <FindingLede finding={shown.view.finding} outbreak={outbreak} /> : null}</div>
      <details className="sheet mt-5 print:hidden" {...(lastResult?.status === "error" || !saved || opened ? { open: true } : {})}>
        <summary className="cursor-pointer font-semibold">{t("page.edit")}</summary>
        <p className="sm mut mt-1">{scripted ? t("page.editNote") : t("page.editNoScript")}</p>
        <EditPanel
          form={form}
          fields={fields}
          formRef={formRef}
          action={action}
          packages={packages}
          liveErrors={outcome?.kind === "invalid" ? outcome.error : {}}
          onBegin={() => formRef.current && live.begin(formRef.current)}
          onChange={() => formRef.current && live.follow(formRef.current)}
        />
        <div className="mt-5 flex flex-wrap gap-3">
          <button type="submit" form={form.id} aria-disabled={saving} className="btn pri">
            {saving ? t("page.saving") : t("page.save")}
          </button>
          {live.edited ? (
            <Button type="button" onClick={onDiscard}>
              {t("page.discard")}
            </Button>
          ) : null}
        </div>
      </details>
      <div className={`top-0 z-[3] mt-2 flex min-h-[44px] flex-wrap items-center gap-x-4 gap-y-1 bg-paper py-1 print:hidden ${live.edited ? "sticky" : ""}`}>
        <p role="status" aria-live="polite" className={`sm ${outcome && outcome.kind !== "view" ? "font-semibold text-clay" : "mut"}`}>
          {scripted ? status : null}
        </p>
        {live.working && live.progress > 0 ? <progress className="wait" value={live.progress} max={1} aria-label={t("live.waiting")} /> : null}
        {live.working ? (
          <Button type="button" small onClick={live.cancel}>
            {t("live.cancel")}
          </Button>
        ) : live.cancelled || live.lost ? (
          <Button type="button" small onClick={live.again}>
            {t("live.again")}
          </Button>
        ) : null}
      </div>
      <div aria-busy={live.working} className={`mt-1 ${stale ? "opacity-60" : ""}`}>
        {shown ? <AssessmentResultView view={shown.view} horizonDays={shown.horizonDays} /> : null}
      </div>
      <section className="sec print:hidden" id="freeze-section" aria-labelledby="freeze-title">
        <header>
          <h2 id="freeze-title">{t("freeze.title")}</h2>
          <p>{t("freeze.note")}</p>
        </header>
        <FreezeForm {...freeze} edited={live.edited} />
      </section>
    </>
  );
}

type Translate = ReturnType<typeof useTranslations<"Assessments">>;
type Live = ReturnType<typeof useRecalculation>;

function statusOf(t: Translate, live: Live, outcome: Live["outcome"]): string {
  if (!live.edited) return t("live.fresh");
  if (live.working) return live.progress > 0.02 ? t("live.progress", { percent: Math.round(live.progress * 20) * 5 }) : t("live.waiting");
  if (live.cancelled) return t("live.cancelled");
  if (live.lost) return t("live.failed");
  if (!outcome || outcome.kind === "view") return t("live.edited");
  if (outcome.kind === "invalid") return t("live.invalid");
  if (outcome.kind === "refused") return t("live.refused", { message: outcome.faults.map((fault) => faultText(t, fault)).join(" ") });
  if (outcome.kind === "failed") return t(`page.failed.${outcome.code}`);
  return outcome.code === "signedOut" ? t("live.signedOut") : t(`stopped.${outcome.code}`);
}

function faultText(t: Translate, { letter, measure, message }: PlacedFault): string {
  const where = letter && measure ? t("page.faultItem", { letter, measure }) : letter ? t("page.faultPackage", { letter }) : (measure ?? "");
  return where ? t("page.faultAt", { where, message }) : message;
}
