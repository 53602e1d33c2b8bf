import type { DoorState } from "./domain/door-clock";

/** What a tablet keeps to draw its screens, with a link and without: names short, no prices, no pay, no secrets. */
export interface ClockBoard {
  readonly shop: { readonly name: string; readonly zone: string; readonly locale: string };
  readonly device: { readonly id: string; readonly name: string };
  /** The server's time when this was made. */
  readonly at: string;
  /** What a badge or PIN is sealed to while there is no link. */
  readonly sealKey: string;
  readonly people: readonly BoardPerson[];
  readonly jobs: readonly BoardJob[];
}

export interface BoardPerson {
  readonly id: string;
  readonly name: string;
  readonly initials: string;
  readonly skills: readonly string[];
  readonly hasPin: boolean;
  /** SHA-256 of tablet id and badge, so that a badge can be told while there is no link. */
  readonly badgeDigest: string | null;
  readonly door: DoorState;
  readonly doorSince: string | null;
  /** Closed door minutes of today. */
  readonly todayMinutes: number;
  readonly running: BoardRunning | null;
}

export interface BoardRunning {
  readonly operationId: string | null;
  readonly indirect: string | null;
  readonly since: string;
}

export interface BoardJob {
  readonly operationId: string;
  readonly tag: string;
  readonly operation: string;
  readonly customer: string;
  readonly family: string;
  readonly station: string;
  readonly skill: string;
  readonly bookMinutes: number;
  /** Closed bench minutes of everybody. */
  readonly doneMinutes: number;
  readonly note: string;
  /** End of a cure it waits for. */
  readonly readyAt: string | null;
  readonly openBefore: string | null;
  /** Why nobody may start it now, in a few words, or null. */
  readonly waits: string | null;
  readonly promisedOn: string | null;
}

/** Sent back with a proof that was right: what only this person sees. */
export interface OwnScreen {
  readonly personId: string;
  readonly pass: string;
  readonly passUntil: string;
  readonly weekMinutes: number;
  readonly overtimeMinutes: number;
  /** An attendance left open on an earlier day: since when, and the last thing seen of the person. */
  readonly missingOut: { readonly since: string; readonly lastSeen: string } | null;
}
