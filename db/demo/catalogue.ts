import type { StaffCtx } from "../../lib/context";
import type { MeasureInput, Quantity } from "../../lib/engine/types";
import type { Locale } from "../../lib/i18n/locales";
import { createMeasure } from "../../lib/measures/create-measure";
import kelmaren from "./kelmaren.json";
import { RESIDENT_WORDS } from "./resident-words";

type Extra = { shortName: string; instruction: string; evidence: string; legalBasis: string; legalLink: string; leadTimeDays: number };

const LAW = "https://law.example.org";
/** What the assessment file doesn't say about its measures. All of it is invented, law included. */
const EXTRA: Record<string, Extra> = {
  sick: { shortName: "sick leave", instruction: "Stay home when ill; pay continues.", evidence: "Invented: a trial in two districts.", legalBasis: "Labour Act, s. 31", legalLink: `${LAW}/labour-act#31`, leadTimeDays: 3 },
  mask: { shortName: "masks", instruction: "Wear a mask that covers nose and mouth.", evidence: "Invented: nine studies, mixed.", legalBasis: "Health Act, s. 12 (1)", legalLink: `${LAW}/health-act#12`, leadTimeDays: 2 },
  air: { shortName: "fresh air", instruction: "Open windows; keep the meter in the green.", evidence: "Invented: five studies, mixed.", legalBasis: "Building Code, s. 44", legalLink: `${LAW}/building-code#44`, leadTimeDays: 7 },
  g100: { shortName: "at most 100", instruction: "Organisers count at the door.", evidence: "Invented: six studies, mixed.", legalBasis: "Health Act, s. 12 (2)", legalLink: `${LAW}/health-act#12`, leadTimeDays: 2 },
  g30: { shortName: "at most 30", instruction: "Organisers count at the door.", evidence: "Invented: six studies, mixed.", legalBasis: "Health Act, s. 12 (2)", legalLink: `${LAW}/health-act#12`, leadTimeDays: 2 },
  g10: { shortName: "at most 10", instruction: "Private meetings are included.", evidence: "Invented: three studies, weak.", legalBasis: "Health Act, s. 12 (2)", legalLink: `${LAW}/health-act#12`, leadTimeDays: 2 },
  eve: { shortName: "close 20:00", instruction: "Leave by 20:00; take-away goes on.", evidence: "Invented: four districts, before and after, growth rate fitted on deaths. Mixed with other measures in two of the four, so the low end is kept at 9 %.", legalBasis: "Health Act, s. 12 (3)", legalLink: `${LAW}/health-act#12`, leadTimeDays: 4 },
  wfh: { shortName: "home work", instruction: "Employers decide which jobs can be done from home; those are.", evidence: "Invented: seven studies, good.", legalBasis: "Health Act, s. 13", legalLink: `${LAW}/health-act#13`, leadTimeDays: 5 },
  sch: { shortName: "half school", instruction: "Half of the classes attend each week.", evidence: "Invented: four studies, mixed.", legalBasis: "Schools Act, s. 20", legalLink: `${LAW}/schools-act#20`, leadTimeDays: 7 },
};

const three = (value: Quantity | undefined, times = 1) => {
  if (value === undefined) return undefined;
  const { low, central, high } = typeof value === "number" ? { low: value, central: value, high: value } : value;
  const figure = (x: number) => Number((x * times).toPrecision(15));
  return { low: figure(low), central: figure(central), high: figure(high) };
};

/** Zero costs stay out: a line of nothing says nothing. */
const cost = (value: Quantity | undefined) => (value === undefined || value === 0 ? undefined : three(value));

/** Puts the demonstration's nine measures in the catalogue, through the command that the desk uses. */
export async function seedCatalogue(ctx: StaffCtx): Promise<Map<string, string>> {
  const ids = new Map<string, string>();
  for (const measure of kelmaren.measures as MeasureInput[]) {
    const extra = EXTRA[measure.id];
    if (!extra) throw new Error(`the demonstration says too little about ${measure.id}`);
    const line = (payer: "public" | "business" | "household") => {
      const found = measure.costs.find((each) => each.payer === payer);
      return { setUp: cost(found?.setUp), perDay: cost(found?.perDay), perResidentDay: cost(found?.perResidentDay) };
    };
    const { id } = await createMeasure(ctx, {
      ...extra,
      code: measure.id,
      name: measure.name,
      cutPercent: three(measure.cut, 100),
      ladder: measure.ladder ?? "",
      maxDays: measure.maxDays ?? "",
      maxDaysWithin: measure.maxDaysWithin ?? "",
      daysUsed: "",
      reviewEveryDays: measure.reviewEveryDays ?? "",
      costs: { public: line("public"), business: line("business"), household: line("household") },
      publicTexts: RESIDENT_WORDS[measure.id] as Partial<Record<Locale, { title: string; detail: string }>>,
    } as never);
    ids.set(measure.id, id);
  }
  return ids;
}
