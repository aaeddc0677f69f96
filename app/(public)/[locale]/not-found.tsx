import { getLocale } from "next-intl/server";
import { Missing } from "../_lib/missing";

export default async function NotFound() {
  return <Missing locale={await getLocale()} />;
}
