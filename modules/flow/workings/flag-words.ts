import { FLOW_FLAGS, LIFT_FLAGS, type FlowFlag, type LiftFlag } from "../domain/flow-flags";

/** A doubt in words; one that belongs to a lift says which: `At 8: flow falls here…`. */
export function flagWords(flag: string): string {
  const [name = "", lift] = flag.split("@");
  if (name in LIFT_FLAGS) return `At lift ${lift ?? ""}: ${LIFT_FLAGS[name as LiftFlag]}`;
  return name in FLOW_FLAGS ? FLOW_FLAGS[name as FlowFlag] : flag;
}
