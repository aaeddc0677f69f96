import type { Metadata } from "next";
import { NextIntlClientProvider } from "next-intl";
import { getTranslations } from "next-intl/server";
import type { ReactNode } from "react";
import { RunningHead } from "@/components/desk/running-head";
import { can, type Permission } from "@/lib/auth/permissions";
import { env } from "@/lib/env";
import { LOCALES } from "@/lib/i18n/locales";
import { requireStaff } from "../_lib/session";
import "../../globals.css";

export const metadata: Metadata = { title: { default: "Ebbmark", template: "%s · Ebbmark" }, robots: { index: false } };
export const dynamic = "force-dynamic";

const PLACES: { href: string; key: "desk" | "outbreaks" | "measures" | "briefings" | "register" | "settings"; needs: Permission }[] = [
  { href: "/desk", key: "desk", needs: "desk:read" },
  { href: "/desk/outbreaks", key: "outbreaks", needs: "desk:read" },
  { href: "/desk/measures", key: "measures", needs: "desk:read" },
  { href: "/desk/briefings", key: "briefings", needs: "desk:read" },
  { href: "/desk/register", key: "register", needs: "register:read" },
  { href: "/desk/settings", key: "settings", needs: "desk:read" },
];

export default async function DeskLayout({ children }: { children: ReactNode }) {
  const actor = await requireStaff();
  const [t, roles, deliveries] = await Promise.all([getTranslations("Desk"), getTranslations("Roles"), getTranslations("Deliveries")]);
  const places = PLACES.filter(({ needs }) => can(actor.role, needs)).map(({ href, key }) => ({ href, label: t(`places.${key}`) }));
  // Before the settings, for those who send.
  if (can(actor.role, "delivery:read")) places.splice(-1, 0, { href: "/desk/deliveries", label: deliveries("title") });
  const locale = "en";
  return (
    <html lang={locale} dir={LOCALES[locale].dir}>
      <body>
        <a className="skip" href="#main">
          {t("skip")}
        </a>
        <RunningHead
          label={t("places.label")}
          places={places}
          demonstration={env().demo ? t("demonstration") : null}
          role={roles(actor.role)}
          signOut={
            <form action="/sign-out" method="post">
              <button type="submit" className="cursor-pointer underline underline-offset-4">
                {t("signOut")}
              </button>
            </form>
          }
        />
        <NextIntlClientProvider>{children}</NextIntlClientProvider>
      </body>
    </html>
  );
}
