"use client";
import { type FieldMetadata, getFormProps, useForm } from "@conform-to/react";
import { useFormatter, useTranslations } from "next-intl";
import { useActionState } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { QuantityFields } from "@/components/forms/quantity-fields";
import { SubmitButton } from "@/components/forms/submit-button";
import type { TransmissionGiven } from "@/lib/engine/types";
import { TRANSMISSION_WAYS } from "@/lib/outbreaks/constants";
import { toNumber } from "@/lib/outbreaks/quantity";
import { readOut } from "@/lib/outbreaks/read-out";
import { saveProfileAction } from "../_actions";

type Quantity = { low: string; central: string; high: string; source: string };
export type ProfileFacts = {
  id: string;
  version: number;
  transmission: { given: TransmissionGiven; value: Quantity };
  infectious: Quantity;
  removed: Quantity;
  infectiousPeriodDays: Quantity;
  latentStage: "yes" | "no";
  latentPeriodDays: Quantity;
  exposedGiven: "growth" | "given";
  exposed: Quantity;
  infectionFatalityPercent: Quantity;
};

/** What is known on day 0. What the central figures amount to follows while one types. */
export function ProfileForm({ facts, populationPersons, readOnly = false }: { facts: ProfileFacts; populationPersons: number; readOnly?: boolean }) {
  const t = useTranslations("Outbreaks.profile");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(saveProfileAction, undefined);
  const [form, fields] = useForm<ProfileFacts, string[]>({ id: "profile", lastResult: lastResult ?? null, defaultValue: facts });
  const typed = readTyped((form.value as Typing | undefined) ?? facts);
  const transmission = fields.transmission.getFieldset();
  const names = {
    "transmission.value": t("value"),
    infectious: t("infectious"),
    removed: t("removed"),
    infectiousPeriodDays: t("infectiousPeriodDays"),
    latentPeriodDays: t("latentPeriodDays"),
    exposed: t("exposed"),
    infectionFatalityPercent: t("infectionFatalityPercent"),
  };
  return (
    <form {...getFormProps(form)} action={action}>
      <fieldset disabled={readOnly} className="min-w-0">
        <ErrorSummary form={form} title={forms("summary")} names={names} />
        <input type="hidden" name="id" value={facts.id} />
        <input type="hidden" name="version" value={facts.version} />
        <section className="sec">
          <header>
            <h2>{t("transmission")}</h2>
            <p>{t("transmissionNote")}</p>
          </header>
          <div className="min-w-0">
            <Choice meta={transmission.given} legend={t("given")} options={TRANSMISSION_WAYS.map((way) => ({ value: way, label: t(`ways.${way}`) }))} chosen={facts.transmission.given} />
            <QuantityFields meta={transmission.value} label={t(`ways.${typed.given}`)} unit={t(`waysUnit.${typed.given}`)} />
            <Equal typed={typed} populationPersons={populationPersons} />
            <p className="how">{t("whatIsB")}</p>
          </div>
        </section>
        <section className="sec">
          <header>
            <h2>{t("inputs")}</h2>
            <p>{t("inputsNote")}</p>
          </header>
          <div className="min-w-0 border-t-2 border-ink">
            <QuantityFields meta={fields.infectious} label={t("infectious")} unit={t("infectiousUnit")} />
            <QuantityFields meta={fields.removed} label={t("removed")} unit={t("removedUnit")} />
            <QuantityFields meta={fields.infectiousPeriodDays} label={t("infectiousPeriodDays")} unit={t("days")} />
            <Choice meta={fields.latentStage} legend={t("latentStage")} options={[{ value: "yes", label: t("yes") }, { value: "no", label: t("no") }]} chosen={facts.latentStage} />
            {typed.latentStage ? (
              <>
                <QuantityFields meta={fields.latentPeriodDays} label={t("latentPeriodDays")} unit={t("days")} />
                <Choice meta={fields.exposedGiven} legend={t("exposedGiven")} options={[{ value: "growth", label: t("exposedGrowth") }, { value: "given", label: t("exposedNumber") }]} chosen={facts.exposedGiven} />
                {typed.exposedGiven ? <QuantityFields meta={fields.exposed} label={t("exposed")} unit={t("infectiousUnit")} /> : null}
              </>
            ) : (
              <input type="hidden" name="exposedGiven" value="growth" />
            )}
            <QuantityFields meta={fields.infectionFatalityPercent} label={t("infectionFatalityPercent")} unit={t("percent")} />
            {readOnly ? null : (
              <div className="mt-6">
                <SubmitButton busy={t("saving")}>{t("save")}</SubmitButton>
              </div>
            )}
          </div>
        </section>
      </fieldset>
    </form>
  );
}

function Choice({ meta, legend, options, chosen }: { meta: FieldMetadata<string>; legend: string; options: { value: string; label: string }[]; chosen: string }) {
  return (
    <fieldset className="border-b border-hair py-2">
      <legend className="float-start me-6 flex min-h-11 items-center text-15">{legend}</legend>
      <div className="flex flex-wrap gap-x-6">
        {options.map(({ value, label }) => (
          <label key={value} className="mb-0 flex min-h-11 items-center gap-2 font-normal">
            <input type="radio" name={meta.name} value={value} defaultChecked={(meta.initialValue ?? chosen) === value} />
            {label}
          </label>
        ))}
      </div>
      {meta.errors?.length ? <p className="ferr">{meta.errors.join(" ")}</p> : null}
    </fieldset>
  );
}

type Typed = { given: TransmissionGiven; value: number; infectious: number; removed: number; infectiousPeriodDays: number; latentPeriodDays: number; exposed: number; latentStage: boolean; exposedGiven: boolean };

const figure = (raw: unknown): number => {
  const value = typeof raw === "string" ? toNumber(raw) : undefined;
  return typeof value === "number" ? value : Number.NaN;
};

type Typing = { [K in keyof ProfileFacts]?: ProfileFacts[K] extends Quantity ? Partial<Quantity> : K extends "transmission" ? { given?: string; value?: Partial<Quantity> } : ProfileFacts[K] };

/** The central figures as they stand in the form. */
function readTyped(facts: Typing): Typed {
  const given = facts.transmission?.given;
  return {
    given: (TRANSMISSION_WAYS as readonly unknown[]).includes(given) ? (given as TransmissionGiven) : "reproductionNumber",
    value: figure(facts.transmission?.value?.central),
    infectious: figure(facts.infectious?.central),
    removed: figure(facts.removed?.central),
    infectiousPeriodDays: figure(facts.infectiousPeriodDays?.central),
    latentPeriodDays: figure(facts.latentPeriodDays?.central),
    exposed: figure(facts.exposed?.central),
    latentStage: facts.latentStage === "yes",
    exposedGiven: facts.exposedGiven === "given",
  };
}

function Equal({ typed, populationPersons }: { typed: Typed; populationPersons: number }) {
  const t = useTranslations("Outbreaks.profile");
  const format = useFormatter();
  const out = readOut({
    ...typed,
    population: populationPersons,
    latentPeriodDays: typed.latentStage ? typed.latentPeriodDays : null,
    exposed: typed.latentStage ? (typed.exposedGiven ? typed.exposed : null) : 0,
  });
  const n = (value: number, digits = 3) => format.number(value, { maximumSignificantDigits: digits });
  return (
    <p className="sm mut min-h-10 py-2" aria-live="polite">
      {out
        ? t("equal", {
            growth: n(out.growthRate),
            state: out.growthRate > 0 ? "grows" : "shrinks",
            days: out.doublingDays === null ? "–" : n(Math.abs(out.doublingDays), 2),
            r: n(out.reproductionNumber),
            b: n(out.thresholdRatio),
            exposed: n(out.exposed),
          })
        : t("equalNone")}
    </p>
  );
}
