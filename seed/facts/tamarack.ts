import type { NewShop } from "../found-shop";
import { DEMO_PASSWORD } from "./ninebark";

/** The second, tiny demo shop: another currency, another zone, VAT. */
export const TAMARACK: NewShop = {
  slug: "tamarack",
  name: "Tamarack Bench & Valve",
  zone: "Europe/Berlin",
  currency: "EUR",
  locale: "en-GB",
  ratesFrom: "2025-05-01",
  settings: {
    address: "Hof 3\nAltbruch", phone: "555-0177", email: "werkstatt@tamarack.example", referencePrefix: "TB", taxNumber: "XX000000000", taxMode: "vat", taxName: "VAT", taxRateText: "21", taxBasis: "invoice",
    laborTaxable: true, partsTaxable: true, suppliesTaxable: true, freightTaxable: true, taxDecidedBy: "Svea Lindqvist, 2025-04-20", suppliesBasisPoints: 0, depositBasisPoints: 2500,
    burdenBasisPoints: 2100, billRateMinor: 9600,
    invoiceWords: "Airflow as measured on our bench under the stated conditions; no promise of power.",
  },
  people: [
    { name: "Svea Lindqvist", shortName: "Svea", roles: ["owner", "counter", "bookkeeper"], email: "svea@tamarack.example", password: DEMO_PASSWORD, badge: "TB-1", pin: "314201", rateMinor: 3000 },
    { name: "Radek Novotny", shortName: "Radek", roles: ["technician", "lead"], skills: ["porting", "seat machine"], email: "radek@tamarack.example", password: DEMO_PASSWORD, badge: "TB-2", pin: "314202", rateMinor: 2600 },
    { name: "Ines Barros", shortName: "Ines", roles: ["inspector", "receiving", "technician"], skills: ["flow bench", "bench"], email: "ines@tamarack.example", password: DEMO_PASSWORD, badge: "TB-3", pin: "314203", rateMinor: 2400 },
  ],
};
