/** The eight stations of the floor, in the order a head walks them. */
export const STATIONS = [
  "Counter in",
  "Tear-down",
  "Bench before",
  "Porting",
  "Seats",
  "Bench after",
  "Assembly",
  "Counter out",
] as const;
export type Station = (typeof STATIONS)[number];

/** Operations of the menu a shop begins with. */
export const OPERATION_CODES = [
  "CLN", "TDN", "PRT", "WLD", "GDE", "SER", "FLB", "EPX", "PIN", "PEX", "SEA", "LAP", "SPR", "FLF", "LSH", "ASM", "INS",
] as const;
export type OperationCode = (typeof OPERATION_CODES)[number];

/** Station at which each of these is done, until the shop says otherwise. */
export const STATION_OF_OPERATION = {
  CLN: "Tear-down",
  TDN: "Tear-down",
  PRT: "Tear-down",
  WLD: "Tear-down",
  GDE: "Seats",
  SER: "Seats",
  FLB: "Bench before",
  EPX: "Porting",
  PIN: "Porting",
  PEX: "Porting",
  SEA: "Seats",
  LAP: "Seats",
  SPR: "Assembly",
  FLF: "Bench after",
  LSH: "Assembly",
  ASM: "Assembly",
  INS: "Assembly",
} as const satisfies Record<OperationCode, Station>;

export type OperationState = "open" | "running" | "done" | "skipped";

export interface RoutedOperation {
  /** Order on the piece, ascending. */
  readonly sequence: number;
  readonly station: Station;
  readonly state: OperationState;
}

/**
 * Station a piece stands at: where something is running, else the station of its next open operation; Counter in
 * while it is not agreed or nothing is routed, Counter out when all is done. Null when the piece is not in the house.
 */
export function stationOf(p: {
  readonly isBookedIn: boolean;
  readonly isGone: boolean;
  readonly isApproved: boolean;
  readonly operations: readonly RoutedOperation[];
}): Station | null {
  if (p.isGone || !p.isBookedIn) return null;
  if (!p.isApproved || p.operations.length === 0) return "Counter in";
  const bySequence = [...p.operations].sort((a, b) => a.sequence - b.sequence);
  const next = bySequence.find((o) => o.state === "running") ?? bySequence.find((o) => o.state === "open");
  return next ? next.station : "Counter out";
}
