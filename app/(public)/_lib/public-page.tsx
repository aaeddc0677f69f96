import type { ReactNode } from "react";
import { PublicShell } from "@/components/public/public-shell";
import type { Locale } from "@/lib/i18n/locales";
import { addressOf } from "./metadata";
import { findSite } from "./published";

/** Every public page stands in this: the shell, with the authority's name from what is published. */
export async function PublicPage({
  locale,
  path,
  demonstration,
  children,
}: {
  locale: Locale;
  path: string;
  demonstration?: { place: string; illness: string } | undefined;
  children: ReactNode;
}) {
  return (
    <PublicShell locale={locale} path={path} site={await findSite(locale)} url={addressOf(locale, path)} demonstration={demonstration}>
      {children}
    </PublicShell>
  );
}
