import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { readLocale } from "../../_lib/locale-param";
import { privateMetadata } from "../../_lib/metadata";
import { Missing } from "../../_lib/missing";

type Props = { params: Promise<{ locale: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  await readLocale(params);
  return privateMetadata((await getTranslations("Public.notFound"))("title"));
}

/** What the web process sends, with status 404, in place of a page that Next would only draw with scripts. */
export default async function NotFoundPage({ params }: Props) {
  return <Missing locale={await readLocale(params)} />;
}
