import type { Metadata } from "next";
import Link from "next/link";
import { NextIntlClientProvider } from "next-intl";
import { getTranslations } from "next-intl/server";
import type { ReactNode } from "react";
import { Wordmark } from "@/components/ui/marks";
import { env } from "@/lib/env";
import { LOCALE_CODES, LOCALES } from "@/lib/i18n/locales";
import { loadMessages } from "@/lib/i18n/messages";
import { accessLocale } from "../_lib/locale";
import "../../globals.css";

export const metadata: Metadata = { title: "Ebbmark", robots: { index: false } };
export const dynamic = "force-dynamic";

const RUNGS = [326, 424, 500, 556, 632, 698, 752, 836];
const WATER = [398, 404.8, 412.3, 420.9, 430.5, 441.3, 453.5, 467.2, 482.6, 499.9, 519.4, 541.3, 565.9, 593.7, 624.9, 660, 699.5, 743.9, 793.9, 850.2];

export default async function AccessLayout({ children }: { children: ReactNode }) {
  const locale = await accessLocale();
  const t = await getTranslations({ locale, namespace: "SignIn" });
  const { SignIn } = await loadMessages(locale);
  return (
    <html lang={locale} dir={LOCALES[locale].dir}>
      <body className="grid min-h-screen overflow-x-hidden xl:grid-cols-[minmax(0,640px)_minmax(0,1fr)]">
        <div className="grid grid-rows-[auto_1fr_auto] gap-8 px-5 py-6 md:px-14">
          <header className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2">
            <span className="wm">
              <Wordmark />
            </span>
            <nav aria-label={t("languages")} className="flex flex-wrap gap-x-3 text-13">
              {LOCALE_CODES.map((code) =>
                code === locale ? (
                  <b key={code} className="py-2" aria-current="true">
                    {LOCALES[code].name}
                  </b>
                ) : (
                  <Link key={code} className="py-2" href={`/sign-in?lang=${code}`} lang={code} hrefLang={code} prefetch={false}>
                    {LOCALES[code].name}
                  </Link>
                ),
              )}
            </nav>
          </header>
          <main id="main" className="w-full max-w-[440px] self-center p-0">
            <NextIntlClientProvider locale={locale} messages={{ SignIn }}>
              {children}
            </NextIntlClientProvider>
          </main>
          <footer className="xs dim">{env().demo ? t("demoNote") : null}</footer>
        </div>
        <div className="relative hidden overflow-hidden xl:block" aria-hidden="true">
          <p className="absolute start-0 top-[150px] max-w-[27rem] text-27 leading-[38px] font-light">{t("motto")}</p>
          <svg aria-hidden="true" viewBox="0 0 800 900" width="800" height="900" preserveAspectRatio="xMinYMin slice" className="h-full min-h-[900px] w-full">
            <path d="M0,392H800" stroke="var(--ink)" strokeWidth="2" />
            {WATER.map((y, i) => (
              <path key={y} d={`M0,${y}H800`} stroke="var(--water)" opacity={0.95 - i * 0.037} />
            ))}
            <path d="M300,900V326 M364,900V326" stroke="var(--ink)" strokeWidth="3" fill="none" />
            {RUNGS.map((y) => (
              <path key={y} d={`M298.5,${y}H365.5`} stroke="var(--ink)" strokeWidth="6" />
            ))}
            <path d="M266,250V446 M257,250H275 M257,446H275" stroke="var(--tide)" strokeWidth="2" />
            <path d="M254,326H278" stroke="var(--tide)" strokeWidth="6" />
          </svg>
        </div>
      </body>
    </html>
  );
}
