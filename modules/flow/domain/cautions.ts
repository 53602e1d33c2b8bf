/** What is said at the point of work, and what it rests on. The source is the rule as it stands in the United States. */
export interface Caution {
  readonly hazard: Hazard;
  readonly title: string;
  readonly words: string;
  readonly source: string;
}

export const HAZARDS = [
  "beryllium", "noise", "welding", "metal dust", "air", "epoxy", "solvent", "springs", "cutters", "fume", "suction", "clearance", "pressure",
] as const;
export type Hazard = (typeof HAZARDS)[number];

/** Ends every caution. */
export const CAUTION_CLOSE = "Local law and your safety data sheet come first. Ask a qualified person.";

/** Texts and sources of every caution. The regulations are cited, not quoted; "common practice" has no published source. */
export const CAUTIONS: Readonly<Record<Hazard, Caution>> = {
  beryllium: {
    hazard: "beryllium", title: "Copper-beryllium seats.",
    words: "The dust can cause lung disease. Cut wet or with local exhaust; no dry grinding, no blowing off, no dry sweeping. Work clothes stay in the shop.",
    source: "29 CFR 1910.1024",
  },
  noise: { hazard: "noise", title: "Noise.", words: "Blower and grinders: wear hearing protection.", source: "29 CFR 1910.95, Table G-16" },
  welding: {
    hazard: "welding", title: "Welding.", words: "Ventilate. Degrease and strip epoxy first. Never near chlorinated solvent: its vapour in the arc makes poison gas.", source: "29 CFR 1910.252(c)",
  },
  "metal dust": {
    hazard: "metal dust", title: "Aluminium, magnesium and titanium dust.",
    words: "Fine dust burns and can explode. Use a collector made for metal dust, keep sparks of steel out of it, never blow it off with compressed air.", source: "NFPA 660 (was NFPA 484)",
  },
  air: { hazard: "air", title: "Compressed air.", words: "Under 30 psi at the nozzle, chip guard and eye protection, never on skin or clothes.", source: "29 CFR 1910.242(b)" },
  epoxy: {
    hazard: "epoxy", title: "Epoxy.", words: "It makes people allergic: gloves, no skin contact, no dry sanding of part-cured resin. Keep its data sheet at hand.",
    source: "29 CFR 1910.1200; EU-OSHA on epoxy resins; HSE RR079",
  },
  solvent: { hazard: "solvent", title: "Solvents and cleaners.", words: "Read the data sheet, ventilate, keep away from flame. No chlorinated cleaner before welding.", source: "29 CFR 1910.1200, 1910.106" },
  springs: { hazard: "springs", title: "Compressed springs.", words: "Stored energy: seat the tool, wear eye protection, keep your face out of line.", source: "29 CFR 1910.133" },
  cutters: { hazard: "cutters", title: "Rotating cutters.", words: "Eye and face protection, no gloves near a rotating cutter, check the collet first.", source: "29 CFR 1910.133, 1910.212" },
  fume: { hazard: "fume", title: "Dust and fume.", words: "Draw it off where it is made. A respirator only under a fitting and care programme.", source: "29 CFR 1910.134" },
  suction: { hazard: "suction", title: "Suction at the bench.", words: "Loose parts, clay and rags can be drawn in; shut the blower before reaching in.", source: "common practice, no source" },
  clearance: {
    hazard: "clearance", title: "Clearances.", words: "After a cam change, milling or sunk seats: measure valve to piston, coil bind and retainer to seal before the engine is started. Follow the service manual.",
    source: "service manual of the engine",
  },
  pressure: { hazard: "pressure", title: "Pressure test.", words: "Water and the least pressure that shows a leak. Stand clear of plugs and plates while it is up.", source: "common practice, no source" },
};

/** Words the shop writes on its menu, and the cautions they stand for. */
const MEANT_BY: Readonly<Record<string, readonly Hazard[]>> = {
  grinding: ["metal dust", "cutters", "fume"],
  "aluminium dust": ["metal dust"],
  dust: ["metal dust", "fume"],
  "compressed air": ["air"],
  solvents: ["solvent"],
  spring: ["springs"],
  "valve to piston": ["clearance"],
};

/** Cautions for the words on an operation, each once, in the order of the list. Words nobody knows bring none. */
export function cautionsFor(words: readonly string[]): Caution[] {
  const isHazard = (w: string): w is Hazard => (HAZARDS as readonly string[]).includes(w);
  const meant = new Set(words.map((w) => w.trim().toLowerCase()).flatMap((w) => (isHazard(w) ? [w] : (MEANT_BY[w] ?? []))));
  return HAZARDS.filter((h) => meant.has(h)).map((h) => CAUTIONS[h]);
}

/** Seats of copper-beryllium, or of nobody knows what, bring that caution with every cut. */
export const seatCaution = (seatMaterial: string): Hazard[] => (["unknown", "copper-beryllium", ""].includes(seatMaterial) ? ["beryllium"] : []);
