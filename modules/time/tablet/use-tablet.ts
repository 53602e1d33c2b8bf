"use client";

import { useCallback, useEffect, useRef, useState } from "react";
import type { ClockBoard, OwnScreen } from "../board";
import { boardAfter, type TabletPress } from "./kept-board";
import { badgeDigest, sealProof } from "./seal-proof";
import { askToStay, keep, keptItems, readBoard, readOffset, writeBoard, type KeptItem } from "./store";
import { askWho, fetchBoard, sendKept, type Said } from "./send";

/** Who is at the tablet. `secret` lives in memory while their screen is open and nowhere else. */
export interface AtTablet {
  readonly personId: string;
  readonly own: OwnScreen | null;
  readonly secret: { readonly pin: string } | { readonly badge: string };
}

export interface PressOf {
  readonly press: TabletPress;
  readonly operationId?: string;
  readonly work?: string;
  readonly more?: Readonly<Record<string, unknown>>;
  readonly word: string;
  readonly text: string;
}
export type Answer = { readonly kind: "done" | "kept" } | { readonly kind: "refused"; readonly code: string; readonly message: string; readonly data: Record<string, unknown> };

const LINKED_MS = 15_000;
const UNLINKED_MS = 4_000;

/** The tablet's own keeping: board, link, what waits. Presses are written here first, then sent. */
export function useTablet() {
  const [board, setBoard] = useState<ClockBoard | null>(null);
  const [state, setState] = useState<"waking" | "not enrolled" | "ready">("waking");
  const [unlinkedSince, setUnlinkedSince] = useState<string | null>(null);
  const [kept, setKept] = useState<readonly KeptItem[]>([]);
  const offset = useRef(0);
  const boardRef = useRef<ClockBoard | null>(null);
  const looks = useRef({ begun: 0, shown: 0 });

  const show = useCallback((next: ClockBoard) => {
    boardRef.current = next;
    setBoard(next);
    void writeBoard(next).catch(() => undefined);
  }, []);
  const link = useCallback((isUp: boolean) => setUnlinkedSince((since) => (isUp ? null : (since ?? new Date(Date.now() + offset.current).toISOString()))), []);
  const refreshKept = useCallback(async () => setKept(await keptItems().catch(() => [])), []);

  /** Sends what waits, then looks at the board anew. */
  const sync = useCallback(async (): Promise<Map<string, Said>> => {
    const said = await sendKept().catch(() => new Map<string, Said>());
    await refreshKept();
    looks.current.begun += 1;
    const mine = looks.current.begun;
    const got = await fetchBoard();
    // An answer that a later question has overtaken is old news.
    if (mine < looks.current.shown) return said;
    looks.current.shown = mine;
    link(got.kind !== "no link");
    if (got.kind === "ok" && got.board) {
      offset.current = got.offsetMs ?? offset.current;
      // While something still waits, the tablet knows more than the server.
      if ((await keptItems().catch(() => [])).every((i) => i.refused !== undefined)) show(got.board);
      setState("ready");
    } else if (got.kind === "not enrolled" || got.kind === "refused") setState("not enrolled");
    else if (boardRef.current) setState("ready");
    return said;
  }, [link, refreshKept, show]);

  useEffect(() => {
    let timer: ReturnType<typeof setTimeout> | undefined;
    let over = false;
    let rounds = 0;
    const round = async () => {
      // A round that was overtaken by a newer one must not set a second timer.
      rounds += 1;
      const mine = rounds;
      await sync();
      if (!over && mine === rounds) timer = setTimeout(() => void round(), LINKED_MS);
    };
    const wake = () => { clearTimeout(timer); void round(); };
    void (async () => {
      await askToStay().catch(() => false);
      offset.current = await readOffset().catch(() => 0);
      const last = await readBoard().catch(() => undefined);
      if (last) { boardRef.current = last; setBoard(last); }
      await round();
    })();
    const lost = () => link(false);
    window.addEventListener("online", wake);
    window.addEventListener("offline", lost);
    return () => { over = true; clearTimeout(timer); window.removeEventListener("online", wake); window.removeEventListener("offline", lost); };
  }, [sync, link]);

  // Without a link, look for it more often than a linked tablet looks at the board.
  useEffect(() => {
    if (unlinkedSince === null) return;
    const timer = setInterval(() => void sync(), UNLINKED_MS);
    return () => clearInterval(timer);
  }, [unlinkedSince, sync]);

  const identify = useCallback(async (input: { kind: "badge"; badge: string } | { kind: "pin"; personId: string; pin: string }): Promise<{ at: AtTablet } | { message: string }> => {
    const secret = input.kind === "badge" ? { badge: input.badge } : { pin: input.pin };
    const said = await askWho(input);
    link(said.kind !== "no link");
    if (said.own) return { at: { personId: said.own.personId, own: said.own, secret } };
    if (said.kind === "refused") return { message: said.message };
    if (said.kind === "not enrolled") { setState("not enrolled"); return { message: "This tablet was put out of use." }; }
    const here = boardRef.current;
    if (!here) return { message: "No link, and this tablet has not seen the shop yet." };
    if (input.kind === "pin") return { at: { personId: input.personId, own: null, secret } };
    const digest = await badgeDigest(here.device.id, input.badge);
    const owner = here.people.find((p) => p.badgeDigest === digest);
    return owner ? { at: { personId: owner.id, own: null, secret } } : { message: "Badge not known here. Ask the manager." };
  }, [link]);

  const pressNow = useCallback(async (at: AtTablet, p: PressOf): Promise<Answer> => {
    const here = boardRef.current;
    if (!here) return { kind: "refused", code: "NO_BOARD", message: "This tablet has not seen the shop yet.", data: {} };
    const requestId = crypto.randomUUID();
    const deviceAt = new Date().toISOString();
    const isPassGood = at.own !== null && new Date(at.own.passUntil).getTime() > Date.now() + offset.current;
    const proof = isPassGood && at.own
      ? { kind: "pass", personId: at.personId, pass: at.own.pass }
      : { kind: "sealed", personId: at.personId, box: await sealProof(here.sealKey, { actId: requestId, ...at.secret }) };
    const input = (counter: number) => ({
      proof, deviceAt, offsetMs: offset.current, counter, actId: requestId, ...(p.operationId ? { operationId: p.operationId } : {}), ...(p.work ? { work: p.work } : {}), ...p.more,
    });
    try {
      await keep({ requestId, press: p.press, input, deviceAt, word: p.word, text: p.text });
    } catch {
      return { kind: "refused", code: "NO_ROOM", message: "This tablet has no room to keep the time. Tell the manager, and use another tablet.", data: {} };
    }
    show(boardAfter(here, { press: p.press, personId: at.personId, at: new Date(Date.now() + offset.current).toISOString(), ...(p.operationId ? { operationId: p.operationId } : {}), ...(p.work ? { work: p.work } : {}) }));
    const said = (await sync()).get(requestId);
    if (said?.kind === "refused") return said;
    return { kind: said?.kind === "ok" ? "done" : "kept" };
  }, [show, sync]);

  // One after the other, so that each is judged by what the one before left.
  const line = useRef<Promise<unknown>>(Promise.resolve());
  const press = useCallback((at: AtTablet, p: PressOf): Promise<Answer> => {
    const turn = line.current.then(() => pressNow(at, p));
    line.current = turn.catch(() => undefined);
    return turn;
  }, [pressNow]);

  return { board, state, unlinkedSince, kept, identify, press, sync };
}
