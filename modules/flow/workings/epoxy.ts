import { refuse } from "@/modules/kernel/result";
import { CAUTIONS } from "../domain/cautions";
import { epoxyState, type EpoxyState } from "../domain/epoxy-state";
import { choice, instant, maybe, num } from "./field";
import { isSo, said } from "./output";
import { named, working } from "./working";

const STATE_WORDS: Readonly<Record<EpoxyState, string>> = {
  mixed: "mixed, may be applied", pot_expired: "past its pot life, throw it away", curing: "curing", hold: "on hold, a person decides", cured: "cured",
};
const FROM_SHEET = "From the product's data sheet.";

/** Epoxy in a port. */
export const EPOXY_WORKINGS = [
  working({
    name: "epoxy_state", title: "Where epoxy stands", purpose: "Whether epoxy in a port may be applied, is curing, or may be ground; a warmer shop never shortens the time.",
    fields: {
      mixed_at: instant("Mixed", "2026-02-03T09:00:00Z"), now: instant("Asked for", "2026-02-04T12:00:00Z"), pot_life_min: { ...num("Pot life", "min", "45"), hint: FROM_SHEET }, min_cure_h: { ...num("Least time of cure", "h", "24"), hint: FROM_SHEET },
      min_temp_C: maybe(num("Lowest temperature", "°C", "15"), FROM_SHEET), max_temp_C: maybe(num("Highest temperature", "°C", "35"), FROM_SHEET), logged_min_temp_C: maybe(num("Coldest logged", "°C", "9")), logged_max_temp_C: maybe(num("Warmest logged", "°C", "21")),
      where: maybe(choice("Where it is", { port: "in the port", pot: "still in the pot" }, "port"), "Left out, it counts as applied in time."), applied_at: maybe(instant("Applied", "2026-02-03T09:20:00Z"), "When it went into the port."),
    },
    worked: ["mixed_at", "now", "pot_life_min", "min_cure_h", "min_temp_C", "logged_min_temp_C"],
    outputs: [said("state", "State", STATE_WORDS), isSo("may_grind", "May be ground and flowed")],
    source: "Rule; every limit from the data sheet of the product used.", caution: `${CAUTIONS.epoxy.words} Weigh plug-hole coolant passages and race fuel against the data sheet.`,
    compute: (v) => (v.where === "pot" && v.applied_at !== undefined ? refuse("INPUT_TWICE", "What is still in the pot was not applied. Leave one of the two out.", { field: "applied_at" }) : named(epoxyState({
      mixedAt: new Date(v.mixed_at), now: new Date(v.now), potLifeMin: v.pot_life_min, minCureH: v.min_cure_h, minTempC: v.min_temp_C, maxTempC: v.max_temp_C, loggedMinTempC: v.logged_min_temp_C, loggedMaxTempC: v.logged_max_temp_C,
      appliedAt: v.applied_at !== undefined ? new Date(v.applied_at) : v.where === "pot" ? null : undefined,
    }), (a) => ({ values: { state: a.state, may_grind: a.mayGrind }, flags: a.flags }))),
  }),
];
