import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { getTranslations } from "next-intl/server";
import { getDeskFormatter } from "@/lib/i18n/desk-formatter";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { StageLine } from "@/app/(desk)/_lib/stage-line";
import { Note, PageHead, Section } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { ButtonLink } from "@/components/ui/button";
import { can } from "@/lib/auth/permissions";
import { env } from "@/lib/env";
import type { ProfileQuantity } from "@/lib/outbreaks/profile";
import { getOutbreak, type Outbreak } from "@/lib/outbreaks/queries";
import { readOut } from "@/lib/outbreaks/read-out";
import { OutbreakForm } from "../_outbreak-form";
import { type ProfileFacts, ProfileForm } from "./_profile-form";

export const metadata: Metadata = { title: "Outbreak profile" };

type Props = { params: Promise<{ outbreakId: string }>; searchParams: Promise<{ saved?: string }> };

export default async function OutbreakPage({ params, searchParams }: Props) {
  const actor = await requireStaff();
  const { outbreakId } = await params;
  const outbreak = await getOutbreak(outbreakId).catch(() => notFound());
  const { saved } = await searchParams;
  const [t, format] = await Promise.all([getTranslations("Outbreaks"), getDeskFormatter()]);
  const readOnly = !can(actor.role, "outbreak:write");
  const { profile } = outbreak;
  const out = profile && readOut(centralOf(outbreak));
  const n = (value: number, digits = 3) => format.number(value, { maximumSignificantDigits: digits });
  return (
    <>
      <StageLine outbreakId={outbreakId} current="outbreak" />
      <main id="main" className="wrap">
        <PageHead
          title={t("profile.title")}
          actions={profile ? <ButtonLink href={`/desk/outbreaks/${outbreakId}/packages`}>{t("profile.toPackages")}</ButtonLink> : null}
          lede={
            out
              ? t.rich("profile.lede", {
                  strong: (chunks) => <b>{chunks}</b>,
                  r: n(out.reproductionNumber),
                  b: n(out.thresholdRatio),
                  state: Math.abs(out.growthRate) < 1e-12 ? "other" : out.growthRate > 0 ? "grows" : "shrinks",
                  days: out.doublingDays === null ? "–" : n(Math.abs(out.doublingDays), 2),
                })
              : t("profile.missing")
          }
        />
        {saved === "profile" ? (
          <div className="mt-4" role="status">
            <Note tone="ok">{t("profile.saved")}</Note>
          </div>
        ) : null}
        <ProfileForm facts={factsOf(outbreak)} populationPersons={outbreak.populationPersons} readOnly={readOnly} key={outbreak.version} />
        <Section title={t("facts.title")} note={t("facts.note")}>
          <OutbreakForm
            key={outbreak.version}
            readOnly={readOnly}
            facts={{ ...outbreak, populationPersons: String(outbreak.populationPersons), priceYear: String(outbreak.priceYear) }}
          />
        </Section>
        <StaffCaution demonstration={env().demo} />
      </main>
    </>
  );
}

const EMPTY = { low: "", central: "", high: "", source: "" };
const text = (value: ProfileQuantity | null | undefined, times = 1) =>
  value ? { low: figure(value.low * times), central: figure(value.central * times), high: figure(value.high * times), source: value.source ?? "" } : EMPTY;
/** Without the digits that multiplying a decimal leaves behind. */
const figure = (value: number) => String(Number(value.toPrecision(15)));

function factsOf({ id, version, profile }: Outbreak): ProfileFacts {
  return {
    id,
    version,
    transmission: { given: profile?.transmission.given ?? "reproductionNumber", value: text(profile?.transmission.value) },
    infectious: text(profile?.infectious),
    removed: profile ? text(profile.removed) : { low: "0", central: "0", high: "0", source: "" },
    infectiousPeriodDays: text(profile?.infectiousPeriodDays),
    latentStage: profile && !profile.latentPeriodDays ? "no" : "yes",
    latentPeriodDays: text(profile?.latentPeriodDays),
    exposedGiven: profile?.exposed ? "given" : "growth",
    exposed: text(profile?.exposed),
    infectionFatalityPercent: text(profile?.infectionFatality, 100),
  };
}

function centralOf({ profile, populationPersons }: Outbreak) {
  if (!profile) throw new Error("an outbreak without a profile has no central figures");
  return {
    population: populationPersons,
    infectious: profile.infectious.central,
    removed: profile.removed.central,
    exposed: profile.latentPeriodDays ? (profile.exposed?.central ?? null) : 0,
    given: profile.transmission.given,
    value: profile.transmission.value.central,
    infectiousPeriodDays: profile.infectiousPeriodDays.central,
    latentPeriodDays: profile.latentPeriodDays?.central ?? null,
  };
}
