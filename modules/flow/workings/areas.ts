import { curtainArea } from "../domain/curtain-area";
import { seatFlowArea } from "../domain/seat-flow-area";
import { sectionAreaMm2 } from "../domain/section-area";
import { throatRatio } from "../domain/throat";
import { choice, maybe, num, nums, oneOrMore } from "./field";
import { figure, said } from "./output";
import { missing, named, working } from "./working";

const STAGES = { "1": "1: cone square to the seat", "2": "2: seat edge to valve edge", "3": "3: the port less the stem" };

/** Areas of valve, seat, port and throat. */
export const AREA_WORKINGS = [
  working({
    name: "curtain_area", title: "Curtain area", purpose: "Area of the ring that open valves leave, the group's lift over diameter, and the one valve that would equal them.",
    fields: { valve_diameters_mm: nums("Valve head diameters", "mm", "31 31"), lift_mm: { ...oneOrMore("Lift", "mm", "8"), hint: "One for all valves, or one for each." } },
    outputs: [figure("curtain_area_mm2", "Curtain area", "mm²", 1), figure("lift_over_diameter", "Lift over diameter", "", 3), figure("equivalent_single_diameter_mm", "Equivalent single valve", "mm", 2)],
    source: "Heywood (1988) section 6.3.2, from memory; the group ratio is derived from equal head area.",
    compute: (v) => named(curtainArea({ valveDiametersMm: v.valve_diameters_mm, liftMm: v.lift_mm }), (a) => ({ values: { curtain_area_mm2: a.curtainAreaMm2, lift_over_diameter: a.liftOverDiameter, equivalent_single_diameter_mm: a.equivalentSingleDiameterMm } })),
  }),
  working({
    name: "seat_flow_area", title: "Flow area at the seat", purpose: "Smallest area one valve leaves at a lift, in three stages from the seat to the port.",
    fields: {
      valve_diameter_mm: num("Valve head diameter", "mm", "31"), seat_radial_width_mm: maybe(num("Seat width, radial", "mm", "1.0"), "This or the width on the face."), seat_face_width_mm: maybe(num("Seat width, on the face", "mm", "1.4"), "This or the radial width."),
      seat_angle_deg: { ...num("Seat angle", "°", "45"), hint: "From the plane of the valve head." }, port_diameter_mm: num("Port diameter", "mm", "27"), stem_diameter_mm: num("Stem diameter", "mm", "5.5"), lift_mm: num("Lift", "mm", "5.0"),
    },
    worked: ["valve_diameter_mm", "seat_radial_width_mm", "seat_angle_deg", "port_diameter_mm", "stem_diameter_mm", "lift_mm"],
    either: [{ of: [["seat_radial_width_mm"], ["seat_face_width_mm"]] }],
    outputs: [figure("area_mm2", "Flow area", "mm²", 1), said("stage", "Stage", STAGES)],
    source: "Heywood (1988) eqs. (6.7)-(6.9), from memory; derived again from the shortest distance between seat and valve.",
    called: { seatWidthMm: "seat_radial_width_mm" },
    compute: (v) => {
      const common = { valveDiameterMm: v.valve_diameter_mm, seatAngleDeg: v.seat_angle_deg, portDiameterMm: v.port_diameter_mm, stemDiameterMm: v.stem_diameter_mm, liftMm: v.lift_mm };
      const width = v.seat_radial_width_mm !== undefined ? { seatRadialWidthMm: v.seat_radial_width_mm } : { seatFaceWidthMm: v.seat_face_width_mm ?? 0 };
      return named(seatFlowArea({ ...common, ...width }), (a) => ({ values: { area_mm2: a.areaMm2, stage: a.stage } }));
    },
  }),
  working({
    name: "section_area", title: "Area of a port section", purpose: "Area of a round, oval or rounded section of a port.",
    fields: {
      shape: choice("Shape", { stadium: "oval with full round ends", circle: "round", rounded_rectangle: "rectangle with round corners" }, "stadium"),
      long_mm: { ...num("Long side", "mm", "34"), hint: "Of a round section, the diameter." }, short_mm: maybe(num("Short side", "mm", "22"), "Not for a round section."), corner_radius_mm: maybe(num("Corner radius", "mm", "6"), "Of a rectangle; at most half the short side."),
    },
    worked: ["shape", "long_mm", "short_mm"],
    outputs: [figure("area_mm2", "Area", "mm²", 1)], source: "Plane geometry.", called: { diameterMm: "long_mm" },
    compute: ({ shape, long_mm, short_mm, corner_radius_mm }) => {
      const area = (r: ReturnType<typeof sectionAreaMm2>) => named(r, (area_mm2) => ({ values: { area_mm2 } }));
      if (shape === "circle") return area(sectionAreaMm2({ shape, diameterMm: long_mm }));
      if (short_mm === undefined) return missing("short_mm", "This shape");
      if (shape === "stadium") return area(sectionAreaMm2({ shape, longMm: long_mm, shortMm: short_mm }));
      return corner_radius_mm === undefined ? missing("corner_radius_mm", "A rectangle") : area(sectionAreaMm2({ shape, longMm: long_mm, shortMm: short_mm, cornerRadiusMm: corner_radius_mm }));
    },
  }),
  working({
    name: "throat_ratio", title: "Throat against valve", purpose: "Throat diameter over valve diameter, and the area of the throat less the stem.",
    fields: { throat_diameter_mm: num("Throat diameter", "mm", "27.4"), valve_diameter_mm: num("Valve head diameter", "mm", "31"), stem_diameter_mm: num("Stem diameter", "mm", "5.5") },
    outputs: [figure("ratio", "Throat over valve", "", 3), figure("throat_area_mm2", "Throat area", "mm²", 1)],
    source: "Definition. The trade quotes about 0.85 to 0.90 (common practice); no alarm is raised.",
    compute: (v) => named(throatRatio({ throatDiameterMm: v.throat_diameter_mm, valveDiameterMm: v.valve_diameter_mm, stemDiameterMm: v.stem_diameter_mm }), (a) => ({ values: { ratio: a.ratio, throat_area_mm2: a.throatAreaMm2 } })),
  }),
];
