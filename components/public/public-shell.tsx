import { getTranslations } from "next-intl/server";
import type { ReactNode } from "react";
import { Caution } from "@/components/briefings/caution";
import { LOCALE_CODES, LOCALES, type Locale } from "@/lib/i18n/locales";

/** The authority as the page's language names it; `lang` is that of the name. */
export type Site = { authority: string; lang: Locale; contact: string; demonstration: boolean };

/** Head, main part and foot of every page that residents read. */
export async function PublicShell({
  locale,
  path,
  site,
  url,
  demonstration,
  children,
}: {
  locale: Locale;
  /** This page without its language, beginning with "/" or empty: the language row leads to the same page. */
  path: string;
  site: Site;
  /** Stands on paper, so that a printed page can be found again. */
  url: string;
  /** What is invented on this page, where that is known. */
  demonstration?: { place: string; illness: string } | undefined;
  children: ReactNode;
}) {
  const [t, words] = await Promise.all([getTranslations({ locale, namespace: "Public" }), getTranslations({ locale, namespace: "Locale" })]);
  const links = ["home", "releases", "corrections", "method", "subscribe", "privacy", "accessibility"] as const;
  return (
    <>
      <a className="skip" href="#main">
        {t("skip")}
      </a>
      <header className="ptop">
        <div className="wrap">
          <a className="auth" href={`/${locale}`} lang={site.lang === locale ? undefined : site.lang}>
            <bdi>{site.authority}</bdi>
          </a>
          <nav className="langs" aria-label={words("row")}>
            {LOCALE_CODES.map((code) =>
              code === locale ? (
                <b key={code} lang={code} aria-current="true">
                  {LOCALES[code].name}
                </b>
              ) : (
                <a key={code} href={`/${code}${path}`} lang={code} hrefLang={code}>
                  {LOCALES[code].name}
                </a>
              ),
            )}
          </nav>
        </div>
        <PublicWaterline />
      </header>
      <main id="main" className="wrap">
        {children}
      </main>
      <footer>
        <div className="wrap">
          <nav aria-label={t("nav.label")}>
            {links.map((link) => (
              <a key={link} href={link === "home" ? `/${locale}` : `/${locale}/${link}`}>
                {t(`nav.${link}`)}
              </a>
            ))}
          </nav>
          <div className="said">
            <Caution locale={locale} demonstration={site.demonstration ? (demonstration ?? true) : null} />
            <p>
              {t("noTracking")} {t("contact")}{" "}
              <a href={`mailto:${site.contact}`}>
                <bdi>{site.contact}</bdi>
              </a>
            </p>
            <p className="paper">
              <bdi>{url}</bdi>
            </p>
          </div>
        </div>
      </footer>
    </>
  );
}

/** Below the line an outbreak grows: the mark of the whole product, drawn across the page. */
function PublicWaterline() {
  return (
    <svg className="wline" width="100%" height="40" aria-hidden="true">
      <line x2="100%" y1="1" y2="1" />
      {[5, 9.9, 15.8, 23.1, 32].map((y) => (
        <line key={y} x2="100%" y1={y} y2={y} />
      ))}
    </svg>
  );
}
