import type { NewShop } from "../found-shop";

/** The demo shop. Every name and figure is invented. */
export const DEMO_PASSWORD = "valve keepers hold";

export const NINEBARK: NewShop = {
  slug: "ninebark",
  name: "Ninebark Headworks",
  zone: "America/Denver",
  currency: "USD",
  locale: "en-US",
  ratesFrom: "2025-05-01",
  settings: {
    referencePrefix: "NB", address: "14 Quarry Spur\nPell Junction", phone: "555-0110", email: "counter@ninebark.example", taxMode: "sales", taxName: "Pell County tax", taxRateText: "7.35", taxBasis: "invoice",
    laborTaxable: false, partsTaxable: true, suppliesTaxable: true, freightTaxable: false, taxDecidedBy: "Priya Venkat, with the shop's adviser, 2025-04-14",
    suppliesBasisPoints: 400, suppliesCapMinor: 6000, depositBasisPoints: 3000, burdenBasisPoints: 1800, billRateMinor: 11000,
    invoiceWords: "Airflow is what we measured on our bench under the stated conditions; it is not a promise of power. Follow the service manual for clearances before starting the engine.",
  },
  people: [
    { name: "Marit Okafor", shortName: "Marit", roles: ["owner"], email: "marit@ninebark.example", password: DEMO_PASSWORD, badge: "NB-1001", pin: "271801", rateMinor: 4500 },
    { name: "Ilse Brandvold", shortName: "Ilse", roles: ["manager"], email: "ilse@ninebark.example", password: DEMO_PASSWORD, badge: "NB-1002", pin: "271802", rateMinor: 3600 },
    { name: "Tobias Renner", shortName: "Tobias", roles: ["counter"], email: "tobias@ninebark.example", password: DEMO_PASSWORD, badge: "NB-1003", pin: "271803", rateMinor: 2200 },
    { name: "Kalea Nomura", shortName: "Kalea", roles: ["counter"], email: "kalea@ninebark.example", password: DEMO_PASSWORD, badge: "NB-1004", pin: "271804", rateMinor: 2100 },
    { name: "Priya Venkat", shortName: "Priya", roles: ["bookkeeper"], email: "priya@ninebark.example", password: DEMO_PASSWORD, badge: "NB-1005", pin: "271805", rateMinor: 2700 },
    { name: "Anselm Quist", shortName: "Anselm", roles: ["technician", "lead"], skills: ["porting"], email: "anselm@ninebark.example", password: DEMO_PASSWORD, badge: "NB-1006", pin: "271806", rateMinor: 3800 },
    { name: "Rosa Delacruz", shortName: "Rosa", roles: ["technician"], skills: ["porting"], email: "rosa@ninebark.example", password: DEMO_PASSWORD, badge: "NB-1007", pin: "271807", rateMinor: 3100 },
    { name: "Hollis Tran", shortName: "Hollis", roles: ["technician"], skills: ["seat machine", "guide hone", "bench"], badge: "NB-1008", pin: "271808", rateMinor: 2950 },
    { name: "Bram Oyelaran", shortName: "Bram", roles: ["technician"], skills: ["seat machine", "bench"], badge: "NB-1009", pin: "271809", rateMinor: 2800 },
    { name: "Wendell Pike", shortName: "Wendell", roles: ["technician"], skills: ["weld bay"], badge: "NB-1010", pin: "271810", rateMinor: 3300 },
    { name: "June Castellano", shortName: "June", roles: ["inspector", "technician"], skills: ["flow bench", "inspection"], email: "june@ninebark.example", password: DEMO_PASSWORD, badge: "NB-1011", pin: "271811", rateMinor: 3000 },
    { name: "Emeka Lund", shortName: "Emeka", roles: ["receiving", "technician"], skills: ["wash", "rig"], email: "emeka@ninebark.example", password: DEMO_PASSWORD, badge: "NB-1012", pin: "271812", rateMinor: 1900 },
  ],
};

/** Menu of operations with book hours and prices; codes are the shop's own. */
export const NINEBARK_MENU = [
  { code: "CLN", name: "Clean and hot wash", station: "Tear-down", skill: "wash", bookMinutes: 30, price: "45.00", needs: [], hazards: ["air", "solvent"], record: "photos after" },
  { code: "TDN", name: "Teardown and measure", station: "Tear-down", skill: "bench", bookMinutes: 60, price: "95.00", needs: ["CLN"], hazards: ["springs"], record: "measurement sheet, parts tray" },
  { code: "PRT", name: "Crack and pressure test", station: "Tear-down", skill: "rig", bookMinutes: 36, price: "65.00", needs: ["CLN"], hazards: ["pressure"], record: "pressure, minutes, drop, result" },
  { code: "WLD", name: "Weld repair", station: "Tear-down", skill: "weld bay", bookMinutes: 60, price: "125.00", needs: ["PRT"], hazards: ["welding"], record: "rod lot, alloy, photo" },
  { code: "GDE", name: "Guide replace, each", station: "Seats", skill: "guide hone", bookMinutes: 24, price: "42.00", needs: ["TDN"], hazards: ["beryllium"], record: "bore, interference, clearance" },
  { code: "SER", name: "Seat ring replace, each", station: "Seats", skill: "seat machine", bookMinutes: 45, price: "80.00", needs: ["GDE"], hazards: ["beryllium"], record: "bore, interference, material" },
  { code: "FLB", name: "Baseline flow", station: "Bench before", skill: "flow bench", bookMinutes: 60, price: "110.00", needs: [], hazards: ["noise", "suction"], record: "reading set" },
  { code: "EPX", name: "Epoxy floor fill", station: "Porting", skill: "porting", bookMinutes: 72, price: "140.00", needs: ["FLB"], hazards: ["epoxy"], record: "lots, grams, times, cure" },
  { code: "PIN", name: "Intake porting", station: "Porting", skill: "porting", bookMinutes: 270, price: "495.00", needs: ["FLB"], hazards: ["metal dust", "cutters", "fume"], record: "throat diameter, recipe note" },
  { code: "PEX", name: "Exhaust porting", station: "Porting", skill: "porting", bookMinutes: 180, price: "330.00", needs: ["FLB"], hazards: ["metal dust", "cutters", "fume"], record: "throat diameter, recipe note" },
  { code: "SEA", name: "Seat cutting, each", station: "Seats", skill: "seat machine", bookMinutes: 30, price: "55.00", needs: ["GDE", "PIN", "PEX"], hazards: ["beryllium"], record: "angles, width, run-out, tip height" },
  { code: "LAP", name: "Lap and vacuum check", station: "Seats", skill: "bench", bookMinutes: 48, price: "75.00", needs: ["SEA"], hazards: [], record: "vacuum per valve, seconds, drop" },
  { code: "SPR", name: "Spring setup", station: "Assembly", skill: "spring tester", bookMinutes: 42, price: "75.00", needs: ["SEA"], hazards: ["springs"], record: "installed height, loads, coil-bind room" },
  { code: "LSH", name: "Lash shims", station: "Assembly", skill: "bench", bookMinutes: 36, price: "65.00", needs: [], hazards: [], record: "lash before and after, shim sizes" },
  { code: "FLF", name: "Final flow", station: "Bench after", skill: "flow bench", bookMinutes: 60, price: "110.00", needs: ["LAP"], hazards: ["noise", "suction"], record: "reading set" },
  { code: "ASM", name: "Assembly", station: "Assembly", skill: "bench", bookMinutes: 48, price: "85.00", needs: ["FLF", "SPR"], hazards: ["springs", "clearance"], record: "torque where asked, parts count" },
  { code: "INS", name: "Final inspection", station: "Counter out", skill: "inspection", bookMinutes: 24, price: "40.00", needs: [], hazards: ["clearance"], record: "checklist, release" },
] as const;

export const NINEBARK_SUPPLIERS = [
  { name: "Greywater Valve Supply", email: "orders@greywater.example", leadDays: 4 },
  { name: "Ostrander Spring & Wire", email: "desk@ostrander.example", leadDays: 6 },
  { name: "Cinder Lane Gasket", email: "sales@cinderlane.example", leadDays: 3 },
  { name: "Plover Adhesives", email: "orders@plover.example", leadDays: 5 },
  { name: "Halfmoon Welding Stores", email: "counter@halfmoon.example", leadDays: 2 },
  { name: "Tern Island Heat Treat", email: "intake@ternisland.example", leadDays: 8 },
] as const;

/** Parts the hero job uses; `opening` is quantity and value as taken on. Class numbers are the shop's own. */
export const HERO_PARTS = [
  { sku: "VIN-S250-310", description: "Intake valve S250-4V, 31 mm, 5.5 stem", partClass: "valve", position: "intake", sale: "62.00", unitCost: "31.40", opening: 8, supplier: "Greywater Valve Supply", price: "31.40", bin: "A-12" },
  { sku: "VEX-S250-265", description: "Exhaust valve S250-4V, 26.5 mm, 5.5 stem", partClass: "valve", position: "exhaust", sale: "48.00", unitCost: "22.00", opening: 0, supplier: "Greywater Valve Supply", price: "22.00", bin: "A-13" },
  { sku: "GDE-S250-BRZ", description: "Valve guide S250-4V, bronze", partClass: "guide", position: "", sale: "18.75", unitCost: "7.50", opening: 6, supplier: "Greywater Valve Supply", price: "7.80", bin: "B-04" },
  { sku: "SPG-S250", description: "Valve spring S250-4V", partClass: "spring", position: "", sale: "24.00", unitCost: "9.85", opening: 24, supplier: "Ostrander Spring & Wire", price: "9.85", bin: "B-10" },
  { sku: "RET-S250-TI", description: "Retainer S250-4V, titanium", partClass: "retainer", position: "", sale: "19.50", unitCost: "8.60", opening: 24, supplier: "Ostrander Spring & Wire", price: "8.60", bin: "B-11" },
  { sku: "KPR-S250", description: "Keeper S250-4V, half", partClass: "keeper", position: "", sale: "2.80", unitCost: "1.25", opening: 64, supplier: "Ostrander Spring & Wire", price: "1.25", bin: "B-12" },
  { sku: "SST-S250", description: "Spring seat S250-4V", partClass: "spring seat", position: "", sale: "5.50", unitCost: "2.10", opening: 24, supplier: "Ostrander Spring & Wire", price: "2.10", bin: "B-13" },
  { sku: "SEL-55", description: "Stem seal 5.5", partClass: "seal", position: "", sale: "6.50", unitCost: "2.45", opening: 40, supplier: "Cinder Lane Gasket", price: "2.45", bin: "C-02" },
  { sku: "SHM-748", description: "Lash shim 7.48 mm, sized", partClass: "lash shim", position: "", sale: "7.25", unitCost: "2.60", opening: 60, supplier: "Ostrander Spring & Wire", price: "2.60", bin: "C-20" },
  { sku: "GSK-S250-HD", description: "Head gasket S250-4V", partClass: "gasket", position: "", sale: "38.50", unitCost: "16.90", opening: 5, supplier: "Cinder Lane Gasket", price: "16.90", bin: "D-01" },
] as const;

/** Spring kit S250-4V: sold as one, issued as parts. */
export const HERO_KIT = { sku: "KIT-SPG-S250", description: "Spring kit S250-4V", sale: "189.00", contents: [["SPG-S250", 4], ["RET-S250-TI", 4], ["KPR-S250", 8], ["SST-S250", 4]] } as const;

/** Porting epoxy by the gram: 0.124 a gram. Sold with the fill at 14.00. */
export const HERO_EPOXY = {
  sku: "EPX-PORT", description: "Porting epoxy, two-part", sale: "14.00", supplier: "Plover Adhesives",
  lots: [["E-2511", "2026-02-28", 400], ["E-2602", "2026-08-31", 30], ["E-2604", "2026-10-31", 900]],
} as const;

export const FAMILIES = ["S125-2S", "S250-4V", "S250-5V", "S450-4V", "S450-5V", "Q450-4V", "T690-8V", "V1200-8V"] as const;
