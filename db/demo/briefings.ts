import { createBriefing } from "../../lib/briefings/create-briefing";
import { CHECKLIST_ITEMS } from "../../lib/briefings/constants";
import { getWhole } from "../../lib/briefings/queries";
import { reviewBriefing } from "../../lib/briefings/review-briefing";
import { saveBriefingSettings } from "../../lib/briefings/save-text";
import { submitBriefing } from "../../lib/briefings/submit-briefing";
import { LOCALE_CODES, type Locale } from "../../lib/i18n/locales";
import { translatorOf } from "../../lib/i18n/translator";
import { publishBriefing } from "../../lib/publications/publish-briefing";
import { reviseBriefing } from "../../lib/publications/revise-briefing";
import { withdrawBriefing } from "../../lib/publications/withdraw-briefing";
import { db } from "../client";
import { subscriptions } from "../schema/index";
import { as } from "./actor";

const REVIEW_DATE = "2027-05-03";
const versionOf = async (id: string) => (await getWhole(id)).row.version;

async function draft(assessmentId: string, packageLetter: string): Promise<string> {
  const { id } = await createBriefing(as("officerOne"), { assessmentId, packageLetter });
  await saveBriefingSettings(as("officerOne"), { briefingId: id, version: 1, reviewDate: REVIEW_DATE });
  return id;
}

async function submit(id: string): Promise<string> {
  const { versionId } = await submitBriefing(as("officerOne"), { briefingId: id, version: await versionOf(id) });
  return versionId;
}

const answers = (answer: "pass" | "fail") => Object.fromEntries(CHECKLIST_ITEMS.map((n) => [`i${n}`, { answer: n === 8 ? answer : ("pass" as const), note: n === 8 && answer === "fail" ? "The range is too far from its figure." : "" }]));

async function publish(id: string, urgency: "urgent" | "routine"): Promise<void> {
  const versionId = await submit(id);
  await reviewBriefing(as("reviewerOne"), { briefingId: id, versionId, decision: "sign", comment: "", items: answers("pass") });
  await publishBriefing(as("officerTwo"), { briefingId: id, version: await versionOf(id), urgency });
}

/** A correction of the demonstration, in every language. */
const CORRECTION: Record<Locale, { cause: string; effect: string }> = {
  en: { cause: "The first version was published before the last check of the dates.", effect: "No figure changed. The advice for you is the same." },
  es: { cause: "La primera versión se publicó antes de la última comprobación de las fechas.", effect: "Ninguna cifra ha cambiado. El consejo para usted es el mismo." },
  fr: { cause: "La première version a été publiée avant la dernière vérification des dates.", effect: "Aucun chiffre n’a changé. Le conseil pour vous reste le même." },
  uk: { cause: "Першу версію оприлюднили до останньої перевірки дат.", effect: "Жодне число не змінилося. Порада для вас та сама." },
  vi: { cause: "Bản đầu được công bố trước lần kiểm tra ngày cuối cùng.", effect: "Không con số nào thay đổi. Lời khuyên cho bạn vẫn như cũ." },
  hi: { cause: "पहला संस्करण तिथियों की अंतिम जाँच से पहले प्रकाशित हो गया था।", effect: "कोई आँकड़ा नहीं बदला। आपके लिए सलाह वही है।" },
  ar: { cause: "نُشرت النسخة الأولى قبل المراجعة الأخيرة للمواعيد.", effect: "لم يتغير أي رقم. والنصيحة لكم هي نفسها." },
};

/** A few hundred invented people on the list, at addresses that lead nowhere. */
async function seedSubscribers(count: number): Promise<void> {
  const now = new Date();
  await db.insert(subscriptions).values(
    Array.from({ length: count }, (_, index) => ({
      email: `resident-${String(index + 1).padStart(3, "0")}@example.org`,
      locale: LOCALE_CODES[index % LOCALE_CODES.length] as Locale,
      state: "active" as const,
      consentText: "demonstration",
      method: "demonstration" as const,
      requestedAt: now,
      confirmedAt: now,
    })),
  );
}

/** Briefings in every state, by the commands and people that would do it: withdrawn, corrected, returned, in review, draft, published. */
export async function seedBriefings(assessmentId: string): Promise<void> {
  const withdrawn = await draft(assessmentId, "A");
  await publish(withdrawn, "routine");
  const notice = Object.fromEntries(await Promise.all(LOCALE_CODES.map(async (locale) => [locale, (await translatorOf(locale, "BriefingTemplates"))("withdrawn")] as const)));
  await withdrawBriefing(as("officerTwo"), { briefingId: withdrawn, version: await versionOf(withdrawn), reason: "The council chose another package (demonstration).", notice, confirmed: "yes" });

  const corrected = await draft(assessmentId, "A");
  await publish(corrected, "routine");
  await reviseBriefing(as("officerTwo"), { briefingId: corrected, version: await versionOf(corrected), kind: "correction", assessmentId: undefined, notes: CORRECTION });
  await publish(corrected, "urgent");

  const returned = await draft(assessmentId, "B");
  const versionId = await submit(returned);
  await reviewBriefing(as("reviewerTwo"), { briefingId: returned, versionId, decision: "return", comment: "Paragraph 3: say in which calculations, and how sure that is.", items: answers("fail") });

  await submit(await draft(assessmentId, "B"));
  await draft(assessmentId, "B");

  await seedSubscribers(300);
  await publish(await draft(assessmentId, "B"), "urgent");
}
