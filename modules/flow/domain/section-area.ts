import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

export type Section =
  | { readonly shape: "circle"; readonly diameterMm: number }
  | { readonly shape: "stadium"; readonly longMm: number; readonly shortMm: number }
  | { readonly shape: "rounded_rectangle"; readonly longMm: number; readonly shortMm: number; readonly cornerRadiusMm: number };

/**
 * Area of a port section, mm2. A stadium has full round ends; a corner radius is at most half the short side.
 * Source: plane geometry. Errors: GEOMETRY_INVALID.
 */
export function sectionAreaMm2(section: Section): Result<number> {
  if (section.shape === "circle") {
    const bad = refuseNotFinite({ diameterMm: section.diameterMm });
    if (bad) return bad;
    return section.diameterMm > 0 ? ok((Math.PI / 4) * section.diameterMm ** 2) : refuseFlow("GEOMETRY_INVALID", "diameterMm");
  }
  const { longMm, shortMm } = section;
  const radius = section.shape === "stadium" ? shortMm / 2 : section.cornerRadiusMm;
  const bad = refuseNotFinite({ longMm, shortMm, cornerRadiusMm: radius });
  if (bad) return bad;
  if (shortMm <= 0) return refuseFlow("GEOMETRY_INVALID", "shortMm");
  if (longMm < shortMm) return refuseFlow("GEOMETRY_INVALID", "longMm");
  if (radius < 0 || radius > shortMm / 2) return refuseFlow("GEOMETRY_INVALID", "cornerRadiusMm");
  return ok(longMm * shortMm - (4 - Math.PI) * radius ** 2);
}
