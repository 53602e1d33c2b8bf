import { refuse, type Result } from "@/modules/kernel/result";
import { CAUTIONS } from "../domain/cautions";
import { nestedSprings, springAtSolid, springRateFromWire, valveSpring, type SpringFigures } from "../domain/valve-spring";
import { choice, maybe, num, nums } from "./field";
import { figure, significant, sometimes } from "./output";
import { missing, named, working, type Made } from "./working";

const CAUTION = `Defer to the service manual for loads, heights and clearances. ${CAUTIONS.springs.words}`;
const SOLID = ["rate", "free_length", "wire_diameter", "total_coils", "units"] as const;
const WIRE = ["wire_mm", "mean_diameter_mm", "active_coils", "G_MPa"] as const;
const OUTPUTS = [
  sometimes(figure("rate_N_mm", "Rate", "N/mm", 1)), sometimes(figure("seat_load_N", "Load on the seat", "N", 0)), sometimes(figure("open_load_N", "Load at full lift", "N", 0)),
  sometimes(figure("coil_bind_clearance_mm", "Clearance to coil bind", "mm", 2)),
];
const figures = (r: Result<SpringFigures>): Result<Made> =>
  named(r, (a) => ({ values: { rate_N_mm: a.rateNMm, seat_load_N: a.seatLoadN, open_load_N: a.openLoadN, coil_bind_clearance_mm: a.coilBindClearanceMm }, flags: a.flags }));

/** Valve springs. */
export const SPRING_WORKINGS = [
  working({
    name: "spring", title: "Valve spring", purpose: "Rate, loads and clearance to coil bind from whatever was measured; or the rate from the wire; or the load at solid length.",
    fields: {
      installed_height_mm: maybe(num("Installed height", "mm", "33.5")), free_length_mm: maybe(num("Free length", "mm", "38.5")), seat_load_N: maybe(num("Load on the seat", "N", "205")), open_load_N: maybe(num("Load at full lift", "N", "560")), rate_N_mm: maybe(num("Rate", "N/mm", "41.3")),
      lift_mm: maybe(num("Lift", "mm", "8.6")), solid_height_mm: maybe(num("Solid height", "mm", "22.8")), shim_mm: maybe(num("Shim under the spring", "mm", "0.5")), minimum_mm: maybe(num("Least clearance to coil bind", "mm", "1.0"), "From the service manual or the spring's maker."),
      wire_mm: maybe(num("Wire", "mm", "3.8"), "From the wire: all four of wire, mean diameter, active coils and G."), mean_diameter_mm: maybe(num("Mean coil diameter", "mm", "24")), active_coils: maybe(num("Active coils", "", "4.5")), G_MPa: maybe(num("Shear modulus G", "MPa", "79000"), "From the wire's data sheet."),
      rate: maybe(num("Rate, in the units below", "", "8"), "At solid length: these five alone."), free_length: maybe(num("Free length, in the units below", "", "2.75")), wire_diameter: maybe(num("Wire, in the units below", "", "0.0625")), total_coils: maybe(num("All coils", "", "14.36")),
      units: maybe(choice("Units", { "lbf,in": "lbf and in", "N,mm": "N and mm" }, "lbf,in")),
    },
    worked: ["installed_height_mm", "seat_load_N", "open_load_N", "lift_mm", "solid_height_mm"],
    either: [{ of: [[...WIRE]], optional: true }, { of: [[...SOLID]], optional: true }, { of: [["rate_N_mm"], ["wire_mm"]], optional: true }],
    outputs: [...OUTPUTS, sometimes(significant("solid_length", "Solid length", "in the units given", 3)), sometimes(significant("load_at_solid", "Load at solid length", "in the units given", 3))],
    source: "Hooke's law; from the wire Shigley, Mechanical Engineering Design, ch. 10, and EN 13906-1; solid length Mott, Machine Elements in Mechanical Design, section 19-6. Least clearances of 1.0 to 1.5 mm are common practice.",
    caution: CAUTION, called: { wireMm: "wire_mm", shearModulusMPa: "G_MPa" },
    compute: (v) => {
      if (v.rate !== undefined && v.free_length !== undefined && v.wire_diameter !== undefined && v.total_coils !== undefined && v.units !== undefined) {
        const others = Object.entries(v).find(([key, value]) => value !== undefined && !(SOLID as readonly string[]).includes(key));
        if (others) return refuse("INPUT_TWICE", "For the load at solid length give its five inputs alone.", { field: others[0] });
        return named(springAtSolid({ rate: v.rate, freeLength: v.free_length, wireDiameter: v.wire_diameter, totalCoils: v.total_coils }), (a) => ({ values: { solid_length: a.solidLength, load_at_solid: a.loadAtSolid } }));
      }
      let rateNMm = v.rate_N_mm;
      if (v.wire_mm !== undefined && v.mean_diameter_mm !== undefined && v.active_coils !== undefined && v.G_MPa !== undefined) {
        const rate = springRateFromWire({ wireMm: v.wire_mm, meanDiameterMm: v.mean_diameter_mm, activeCoils: v.active_coils, shearModulusMPa: v.G_MPa });
        if (!rate.ok) return rate;
        rateNMm = rate.value;
      }
      const measured = { installedHeightMm: v.installed_height_mm, freeLengthMm: v.free_length_mm, seatLoadN: v.seat_load_N, openLoadN: v.open_load_N, liftMm: v.lift_mm, solidHeightMm: v.solid_height_mm, shimMm: v.shim_mm };
      if (rateNMm === undefined && Object.values(measured).every((x) => x === undefined)) return missing("installed_height_mm", "The spring: what was measured");
      return figures(valveSpring({ ...measured, rateNMm, minimumClearanceMm: v.minimum_mm }));
    },
  }),
  working({
    name: "nested_springs", title: "Springs inside each other", purpose: "What nested springs do together: loads and rates add, the smallest clearance governs.",
    fields: {
      rates_N_mm: maybe(nums("Rates", "N/mm", "41.3 18.2"), "One for each spring."), seat_loads_N: maybe(nums("Loads on the seat", "N", "205 90"), "One for each spring."), open_loads_N: maybe(nums("Loads at full lift", "N", "560 246"), "One for each spring."),
      coil_bind_clearances_mm: maybe(nums("Clearances to coil bind", "mm", "2.10 1.60"), "One for each spring."),
    },
    worked: ["rates_N_mm", "seat_loads_N", "open_loads_N", "coil_bind_clearances_mm"],
    outputs: OUTPUTS, source: "Statics: forces of springs side by side add.", caution: CAUTION, called: { springs: "rates_N_mm" },
    compute: (v) => {
      const lists = Object.entries(v).flatMap(([key, list]) => (list === undefined ? [] : [{ key, list }]));
      const count = lists[0]?.list.length ?? 0;
      const uneven = lists.find(({ list }) => list.length !== count);
      if (uneven) return refuse("TOO_FEW_POINTS", "Give one number for each spring in every list.", { field: uneven.key });
      const springs = Array.from({ length: count }, (_, i): SpringFigures => ({
        rateNMm: v.rates_N_mm?.[i], seatLoadN: v.seat_loads_N?.[i], openLoadN: v.open_loads_N?.[i], coilBindClearanceMm: v.coil_bind_clearances_mm?.[i],
        flags: (v.coil_bind_clearances_mm?.[i] ?? 1) <= 0 ? ["COIL_BIND"] : [],
      }));
      return figures(nestedSprings(springs));
    },
  }),
];
