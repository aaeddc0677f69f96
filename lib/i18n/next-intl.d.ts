import type { Messages } from "./messages";
import type { Locale as AppLocale } from "./locales";

declare module "next-intl" {
  interface AppConfig {
    Locale: AppLocale;
    Messages: Messages;
  }
}
