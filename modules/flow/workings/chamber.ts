import { chamberFromFills } from "../domain/chamber-fills";
import { chamberForRatioCc, compressionRatio, millingChangeCc, sweptVolumeCc } from "../domain/compression-ratio";
import { maybe, num, nums } from "./field";
import { figure } from "./output";
import { missing, named, working } from "./working";

const BORE = num("Bore", "mm", "72");
const STROKE = num("Stroke", "mm", "61.2");

/** Chamber volume and compression ratio. */
export const CHAMBER_WORKINGS = [
  working({
    name: "swept_volume", title: "Swept volume", purpose: "What one piston sweeps.", fields: { bore_mm: BORE, stroke_mm: STROKE },
    outputs: [figure("swept_cc", "Swept volume", "cc", 1)], source: "Geometry.",
    compute: (v) => named(sweptVolumeCc({ boreMm: v.bore_mm, strokeMm: v.stroke_mm }), (swept_cc) => ({ values: { swept_cc } })),
  }),
  working({
    name: "compression_ratio", title: "Compression ratio", purpose: "Clearance volume and compression ratio of one cylinder.",
    fields: {
      swept_cc: maybe(num("Swept volume", "cc", "410.25"), "This, or bore and stroke."), bore_mm: maybe(num("Bore", "mm", "100"), "With the stroke, and with a deck height."), stroke_mm: maybe(num("Stroke", "mm", "83"), "With the bore."), chamber_cc: num("Chamber", "cc", "50"),
      deck_cc: maybe(num("Deck volume", "cc", "9.06"), "This or the deck height."), deck_clearance_mm: maybe(num("Deck height", "mm", "0.8"), "Piston below the deck is positive. Needs the bore."),
      gasket_cc: maybe(num("Gasket volume", "cc", "0"), "This, or gasket bore and thickness."), gasket_bore_mm: maybe(num("Gasket bore", "mm", "102")), gasket_thickness_mm: maybe(num("Gasket thickness, compressed", "mm", "0.6")),
      piston_cc: maybe(num("Piston pockets less dome", "cc", "0")), dome_cc: maybe(num("Dome", "cc", "3"), "Taken off."),
    },
    worked: ["swept_cc", "chamber_cc", "deck_cc", "gasket_cc", "piston_cc"],
    either: [{ of: [["swept_cc"], ["stroke_mm"]] }, { of: [["deck_cc"], ["deck_clearance_mm"]], optional: true }, { of: [["gasket_cc"], ["gasket_bore_mm", "gasket_thickness_mm"]], optional: true }],
    outputs: [figure("clearance_cc", "Clearance volume", "cc", 1), figure("ratio", "Compression ratio", "to 1", 2)],
    source: "Heywood (1988) eq. (2.1), from memory.",
    compute: ({ swept_cc, bore_mm, stroke_mm, ...v }) => {
      const rest = { chamberCc: v.chamber_cc, deckCc: v.deck_cc, deckClearanceMm: v.deck_clearance_mm, gasketCc: v.gasket_cc, gasketBoreMm: v.gasket_bore_mm, gasketThicknessMm: v.gasket_thickness_mm, pistonCc: v.piston_cc, domeCc: v.dome_cc };
      if (bore_mm === undefined && v.deck_clearance_mm !== undefined) return missing("bore_mm", "A deck height");
      if (swept_cc === undefined && bore_mm === undefined) return missing("bore_mm", "The stroke");
      const made = swept_cc !== undefined ? compressionRatio({ ...rest, sweptCc: swept_cc, boreMm: bore_mm }) : compressionRatio({ ...rest, boreMm: bore_mm ?? 0, strokeMm: stroke_mm ?? 0 });
      return named(made, (a) => ({ values: { clearance_cc: a.clearanceCc, ratio: a.ratio } }));
    },
  }),
  working({
    name: "chamber_for_ratio", title: "Chamber for a ratio", purpose: "Chamber volume that gives a wanted compression ratio.",
    fields: { bore_mm: BORE, stroke_mm: STROKE, target_ratio: num("Wanted ratio", "to 1", "12.0"), other_clearance_cc: { ...num("Other clearance", "cc", "3.2"), hint: "Gasket, deck and crown together." } },
    outputs: [figure("chamber_cc", "Chamber", "cc", 1)], source: "Algebra of the definition.",
    compute: (v) => named(chamberForRatioCc({ boreMm: v.bore_mm, strokeMm: v.stroke_mm, targetRatio: v.target_ratio, otherClearanceCc: v.other_clearance_cc }), (chamber_cc) => ({ values: { chamber_cc } })),
  }),
  working({
    name: "milling_change", title: "What milling takes off", purpose: "Change of the chamber's volume from a cut across the deck.",
    fields: { chamber_area_mm2: num("Chamber area at the deck", "mm²", "3900"), cut_mm: num("Cut", "mm", "0.30") },
    outputs: [figure("change_cc", "Chamber changes by", "cc", 2)], source: "Geometry: area times cut.",
    caution: "Milling brings valves nearer to pistons. Work out valve to piston as well, and measure before the engine is started.",
    compute: (v) => named(millingChangeCc({ chamberAreaMm2: v.chamber_area_mm2, cutMm: v.cut_mm }), (change_cc) => ({ values: { change_cc } })),
  }),
  working({
    name: "chamber_from_fills", title: "Chamber from burette fills", purpose: "Mean of three or more fills, and whether they agree.",
    fields: { fills_cc: nums("Fills", "cc", "19.4 19.5 19.4") },
    outputs: [figure("chamber_cc", "Chamber", "cc", 1), figure("spread_cc", "Spread", "cc", 1)], source: "Mean; the 0.2 cc is common practice, no published source.",
    compute: (v) => named(chamberFromFills(v.fills_cc), (a) => ({ values: { chamber_cc: a.chamberCc, spread_cc: a.spreadCc }, flags: a.flags })),
  }),
];
