import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { ofSlug } from "@/lib/publications/published";
import { BriefingPage, briefingMetadata } from "../../../_lib/briefing-page";
import { readLocale } from "../../../_lib/locale-param";
import { listReleases } from "../../../_lib/published";

type Props = { params: Promise<{ locale: string; slug: string }> };

/** Briefings known when the site is built; later ones are made when first asked for, and kept. */
export async function generateStaticParams(): Promise<{ slug: string }[]> {
  return [...new Set((await listReleases()).map(({ slug }) => slug))].map((slug) => ({ slug }));
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const [newest] = ofSlug(await listReleases(), (await params).slug);
  return newest ? briefingMetadata(newest, await readLocale(params), `/briefings/${newest.slug}`) : {};
}

/** The moving address of a briefing: always its newest version, also when that was withdrawn. */
export default async function Briefing({ params }: Props) {
  const locale = await readLocale(params);
  const versions = ofSlug(await listReleases(), (await params).slug);
  const [newest] = versions;
  if (!newest) notFound();
  return <BriefingPage release={newest} versions={versions} locale={locale} path={`/briefings/${newest.slug}`} />;
}
