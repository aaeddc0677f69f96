import type { StaffCtx } from "../../lib/context";
import type { AssessmentInput, Quantity } from "../../lib/engine/types";
import { LOCALE_CODES } from "../../lib/i18n/locales";
import { createOutbreak } from "../../lib/outbreaks/create-outbreak";
import { saveProfile } from "../../lib/outbreaks/update-outbreak";
import { createPackage } from "../../lib/packages/create-package";
import { dateOf } from "../../lib/packages/days";
import { updatePackage } from "../../lib/packages/update-package";
import kelmaren from "./kelmaren.json";

const demo = kelmaren as AssessmentInput;

const three = (value: Quantity, source: string, times = 1) => {
  const { low, central, high } = typeof value === "number" ? { low: value, central: value, high: value } : value;
  const figure = (x: number) => Number((x * times).toPrecision(15));
  return { low: figure(low), central: figure(central), high: figure(high), source };
};

const percent = (value: Quantity) => {
  const figure = (x: number) => Number((x * 100).toPrecision(15));
  return typeof value === "number" ? { central: figure(value) } : { low: figure(value.low), central: figure(value.central), high: figure(value.high) };
};

/** The invented outbreak with its profile and packages A, B and C. */
export async function seedOutbreak(ctx: StaffCtx, measureIds: ReadonlyMap<string, string>): Promise<{ outbreakId: string }> {
  const { outbreak } = demo;
  const { id } = await createOutbreak(ctx, {
    name: outbreak.name,
    place: outbreak.place,
    populationPersons: outbreak.population,
    currency: outbreak.currency,
    priceYear: outbreak.priceYear,
    dayZero: outbreak.dayZero,
    languages: [...LOCALE_CODES],
    publicNames: {
      en: { name: "sedge fever", place: "Kelmaren" },
      es: { name: "fiebre de la juncia", place: "Kelmaren" },
      fr: { name: "fièvre des laîches", place: "Kelmaren" },
      uk: { name: "осокова гарячка", place: "Кельмарен" },
      vi: { name: "sốt cói", place: "Kelmaren" },
      hi: { name: "सेज बुखार", place: "केलमारेन" },
      ar: { name: "حمّى السُّعد", place: "كيلمارين" },
    },
  } as never);
  await saveProfile(ctx, {
    id,
    version: 1,
    transmission: { given: outbreak.transmission.given, value: three(outbreak.transmission.value, "Invented: literature 1.8 to 2.5, note 2") },
    infectious: three(outbreak.infectious, "Invented: 23 confirmed, ascertainment 25 to 55 %"),
    removed: three(outbreak.removed ?? 0, "Invented: new illness; no earlier exposure found"),
    infectiousPeriodDays: three(outbreak.infectiousPeriod, "Invented: contact study, 84 pairs, note 3"),
    latentStage: "yes",
    latentPeriodDays: three(outbreak.latentPeriod ?? 0, "Invented: contact study, note 3"),
    exposedGiven: "growth",
    exposed: undefined,
    infectionFatalityPercent: three(outbreak.infectionFatality, "Invented: neighbouring district, age-adjusted, note 5", 100),
  } as never);
  for (const each of demo.packages) {
    const made = await createPackage(ctx, { outbreakId: id, name: each.name });
    await updatePackage(ctx, {
      id: made.id,
      version: 1,
      name: each.name,
      dayZero: outbreak.dayZero,
      lines: each.items.map(({ measure, uptake, startDay, endDay }) => ({
        measureId: measureIds.get(measure) ?? "",
        included: true,
        uptakePercent: percent(uptake ?? 1),
        from: dateOf(outbreak.dayZero, startDay),
        until: endDay === null ? "" : dateOf(outbreak.dayZero, endDay - 1),
        never: endDay === null,
      })),
    } as never);
  }
  return { outbreakId: id };
}
