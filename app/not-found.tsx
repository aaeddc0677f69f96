import "./public.css";
import { LOCALE_CODES, LOCALES } from "@/lib/i18n/locales";
import { loadMessages } from "@/lib/i18n/messages";

export const metadata = { title: "404" };

/** Nobody knows the reader's language here, so every one has its sentence. */
export default async function NotFound() {
  const catalogues = await Promise.all(LOCALE_CODES.map(async (locale) => ({ locale, messages: await loadMessages(locale) })));
  return (
    <html lang="en">
      <body className="pub">
        <main className="wrap">
          <h1>404</h1>
          <ul className="cards pgap">
            {catalogues.map(({ locale, messages }) => (
              <li key={locale} lang={locale} dir={LOCALES[locale].dir}>
                {messages.Public.notFound.title}. <a href={`/${locale}`}>{messages.Public.notFound.home}</a>
              </li>
            ))}
          </ul>
        </main>
      </body>
    </html>
  );
}
