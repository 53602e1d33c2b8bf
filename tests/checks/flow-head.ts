import { expect } from "vitest";
import { retainerToSeal, seatRunout, valveToPiston } from "@/modules/flow/domain/clearances";
import { chamberForRatioCc, compressionRatio, sweptVolumeCc } from "@/modules/flow/domain/compression-ratio";
import { curtainArea } from "@/modules/flow/domain/curtain-area";
import { epoxyState } from "@/modules/flow/domain/epoxy-state";
import { lashAfterSeatCut, lashShim, lashShimCandidates } from "@/modules/flow/domain/lash-shim";
import { seatFlowArea } from "@/modules/flow/domain/seat-flow-area";
import { sectionAreaMm2 } from "@/modules/flow/domain/section-area";
import { throatRatio } from "@/modules/flow/domain/throat";
import { springAtSolid, valveSpring } from "@/modules/flow/domain/valve-spring";
import { named, oneOf, type Adapters } from "./check-case";

/** Adapters of the check cases on the head: areas, ratio, springs, lash, clearances, epoxy. */
export const HEAD_ADAPTERS: Adapters = {
  curtain_area: (i) =>
    named(curtainArea({ valveDiametersMm: i.nums("valve_diameters_mm"), liftMm: i.num("lift_mm") }), (v) => ({
      curtain_area_mm2: v.curtainAreaMm2,
      lift_over_diameter: v.liftOverDiameter,
      equivalent_single_diameter_mm: v.equivalentSingleDiameterMm,
    })),
  seat_flow_area: (i) =>
    named(
      seatFlowArea({
        valveDiameterMm: i.num("valve_diameter_mm"),
        seatRadialWidthMm: i.num("seat_radial_width_mm"),
        seatAngleDeg: i.num("seat_angle_deg"),
        portDiameterMm: i.num("port_diameter_mm"),
        stemDiameterMm: i.num("stem_diameter_mm"),
        liftMm: i.num("lift_mm"),
      }),
      (v) => ({ area_mm2: v.areaMm2, stage: v.stage }),
    ),
  section_area: (i) =>
    named(sectionAreaMm2({ shape: oneOf(i.text("shape"), ["stadium"] as const), longMm: i.num("long_mm"), shortMm: i.num("short_mm") }), (v) => ({
      area_mm2: v,
    })),
  throat_ratio: (i) =>
    named(
      throatRatio({ throatDiameterMm: i.num("throat_diameter_mm"), valveDiameterMm: i.num("valve_diameter_mm"), stemDiameterMm: i.num("stem_diameter_mm") }),
      (v) => ({ ratio: v.ratio, throat_area_mm2: v.throatAreaMm2 }),
    ),
  swept_volume: (i) => named(sweptVolumeCc({ boreMm: i.num("bore_mm"), strokeMm: i.num("stroke_mm") }), (v) => ({ swept_cc: v })),
  compression_ratio: (i) =>
    named(
      compressionRatio({
        sweptCc: i.num("swept_cc"),
        chamberCc: i.num("chamber_cc"),
        deckCc: i.num("deck_cc"),
        gasketCc: i.num("gasket_cc"),
        pistonCc: i.num("piston_cc"),
      }),
      (v) => ({ clearance_cc: v.clearanceCc, ratio: v.ratio }),
    ),
  chamber_for_ratio: (i) =>
    named(
      chamberForRatioCc({
        boreMm: i.num("bore_mm"),
        strokeMm: i.num("stroke_mm"),
        targetRatio: i.num("target_ratio"),
        otherClearanceCc: i.num("other_clearance_cc"),
      }),
      (v) => ({ chamber_cc: v }),
    ),
  spring: (i) => {
    if (i.has("free_length")) {
      expect(i.text("units")).toBe("lbf,in");
      return named(
        springAtSolid({ rate: i.num("rate"), freeLength: i.num("free_length"), wireDiameter: i.num("wire_diameter"), totalCoils: i.num("total_coils") }),
        (v) => ({ solid_length: v.solidLength, load_at_solid: v.loadAtSolid }),
      );
    }
    return named(
      valveSpring({
        installedHeightMm: i.num("installed_height_mm"),
        seatLoadN: i.num("seat_load_N"),
        openLoadN: i.num("open_load_N"),
        liftMm: i.num("lift_mm"),
        solidHeightMm: i.num("solid_height_mm"),
      }),
      (v) => ({ rate_N_mm: v.rateNMm, coil_bind_clearance_mm: v.coilBindClearanceMm, flags: v.flags }),
    );
  },
  lash_shim: (i) => {
    const common = { oldShimMm: i.num("old_shim_mm"), measuredMm: i.num("measured_mm") };
    return i.has("target_mm")
      ? named(lashShim({ ...common, targetMm: i.num("target_mm") }), (v) => ({ new_shim_mm: v }))
      : named(lashShimCandidates({ ...common, minMm: i.num("min_mm"), maxMm: i.num("max_mm"), stepMm: i.num("step_mm") }), (v) => ({
          candidates: v.candidates.map((c) => ({ shim_mm: c.shimMm, clearance_mm: c.clearanceMm })),
        }));
  },
  lash_after_seat_cut: (i) =>
    named(lashAfterSeatCut({ clearanceBeforeMm: i.num("clearance_before_mm"), valveSinkMm: i.num("valve_sink_mm") }), (v) => ({
      valve_sink_mm: v.valveSinkMm,
      clearance_after_mm: v.clearanceAfterMm,
    })),
  valve_to_piston: (i) =>
    named(
      valveToPiston({
        clayMm: i.num("clay_mm"),
        milledMm: i.num("milled_mm"),
        valveAngleDeg: i.num("valve_angle_deg"),
        minimumMm: i.num("minimum_mm"),
      }),
      (v) => ({ clearance_mm: v.clearanceMm, flags: v.flags }),
    ),
  retainer_to_seal: (i) =>
    named(retainerToSeal({ distanceClosedMm: i.num("distance_closed_mm"), liftMm: i.num("lift_mm"), minimumMm: i.num("minimum_mm") }), (v) => ({
      clearance_mm: v.clearanceMm,
      flags: v.flags,
    })),
  seat_runout: (i) =>
    named(seatRunout({ totalIndicatorMm: i.num("total_indicator_mm"), limitMm: i.num("limit_mm") }), (v) => ({
      offset_mm: v.offsetMm,
      within_limit: v.withinLimit,
    })),
  epoxy_state: (i) =>
    named(
      epoxyState({
        mixedAt: new Date(i.text("mixed_at")),
        now: new Date(i.text("now")),
        potLifeMin: i.num("pot_life_min"),
        minCureH: i.num("min_cure_h"),
        minTempC: i.num("min_temp_C"),
        loggedMinTempC: i.num("logged_min_temp_C"),
      }),
      (v) => ({ state: v.state, may_grind: v.mayGrind, flags: v.flags }),
    ),
};
