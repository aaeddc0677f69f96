import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { ofSlug } from "@/lib/publications/published";
import { BriefingPage, briefingMetadata } from "../../../../../_lib/briefing-page";
import { readLocale } from "../../../../../_lib/locale-param";
import { listReleases } from "../../../../../_lib/published";

type Props = { params: Promise<{ locale: string; slug: string; number: string }> };

export const generateStaticParams = () => [];

async function find(params: Props["params"]) {
  const { slug, number } = await params;
  const versions = ofSlug(await listReleases(), slug);
  return { versions, release: versions.find((version) => String(version.number) === number) };
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { release } = await find(params);
  return release ? briefingMetadata(release, await readLocale(params), `/briefings/${release.slug}/v/${release.number}`) : {};
}

/** The permanent address of one version. */
export default async function BriefingVersion({ params }: Props) {
  const locale = await readLocale(params);
  const { versions, release } = await find(params);
  if (!release) notFound();
  return <BriefingPage release={release} versions={versions} locale={locale} path={`/briefings/${release.slug}/v/${release.number}`} />;
}
