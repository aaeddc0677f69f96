import type { TransmissionGiven } from "../engine/types";

export const TRANSMISSION_WAYS = ["reproductionNumber", "effectiveReproductionNumber", "growthRate", "doublingTime", "rate"] as const satisfies readonly TransmissionGiven[];

/** ISO 4217 codes offered; any of them may be the outbreak's currency. */
export const CURRENCIES = [
  "AED", "ARS", "AUD", "BGN", "BRL", "CAD", "CHF", "CLP", "CNY", "COP", "CZK", "DKK", "EGP", "EUR", "GBP", "HKD", "HUF", "IDR", "ILS", "INR",
  "JPY", "KES", "KRW", "MAD", "MXN", "MYR", "NGN", "NOK", "NZD", "PEN", "PHP", "PKR", "PLN", "RON", "SAR", "SEK", "SGD", "THB", "TRY", "UAH",
  "USD", "VND", "XAF", "XOF", "ZAR",
] as const;
