import "../../public.css";
import type { Metadata, Viewport } from "next";
import type { ReactNode } from "react";
import { env } from "@/lib/env";
import { LOCALE_CODES, LOCALES } from "@/lib/i18n/locales";
import { readLocale } from "../_lib/locale-param";

export const generateStaticParams = () => LOCALE_CODES.map((locale) => ({ locale }));

export const generateMetadata = (): Metadata => ({ metadataBase: new URL(env().EBBMARK_URL), formatDetection: { telephone: false, date: false, address: false, email: false } });

export const viewport: Viewport = {
  width: "device-width",
  initialScale: 1,
  themeColor: [
    { media: "(prefers-color-scheme: light)", color: "#f2f4ef" },
    { media: "(prefers-color-scheme: dark)", color: "#191b18" },
  ],
};

export default async function PublicLayout({ children, params }: { children: ReactNode; params: Promise<{ locale: string }> }) {
  const locale = await readLocale(params);
  return (
    <html lang={locale} dir={LOCALES[locale].dir}>
      <body className="pub">{children}</body>
    </html>
  );
}
