import { db } from "../client";
import { users } from "../schema/index";

/** Invented people of the demonstration; ids are fixed so that the other seeds can act for them. */
export const PEOPLE = {
  adviserOne: { id: "demo-adviser-1", name: "Ilse Maron", email: "ilse.maron@example.org", role: "adviser" },
  adviserTwo: { id: "demo-adviser-2", name: "Teodor Vance", email: "teodor.vance@example.org", role: "adviser" },
  officerOne: { id: "demo-officer-1", name: "Noor Haddad", email: "noor.haddad@example.org", role: "communications" },
  officerTwo: { id: "demo-officer-2", name: "Lucía Ferrer", email: "lucia.ferrer@example.org", role: "communications" },
  officerThree: { id: "demo-officer-3", name: "Olena Kovalchuk", email: "olena.kovalchuk@example.org", role: "communications" },
  reviewerOne: { id: "demo-reviewer-1", name: "Henrik Solberg", email: "henrik.solberg@example.org", role: "legal" },
  reviewerTwo: { id: "demo-reviewer-2", name: "Amara Diallo", email: "amara.diallo@example.org", role: "legal" },
  administrator: { id: "demo-administrator", name: "Pia Lindqvist", email: "pia.lindqvist@example.org", role: "administrator" },
} as const;

export type PersonKey = keyof typeof PEOPLE;

export async function seedPeople(): Promise<void> {
  await db.insert(users).values(Object.values(PEOPLE).map((person) => ({ ...person, status: "active" as const, locale: "en" as const, emailVerified: new Date() })));
}
