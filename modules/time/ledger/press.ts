import "server-only";
import { ruleOf } from "@/db/errors";
import type { TxContext } from "@/modules/access/context";
import { ok, type Refused, type Result } from "@/modules/kernel/result";
import { actingPerson, type Acting, type Stamp } from "../identity/acting";
import { clockState, DOUBT, hasLaterTimes, type ClockState } from "./clock-state";
import { writePunch, type PunchFacts } from "./write";

export interface Pressed {
  readonly personId: string;
  readonly personName: string;
  /** When it counts. */
  readonly at: string;
  readonly flags: readonly string[];
  /** Why it is kept but does not count yet, or null. */
  readonly doubt: string | null;
}

class Back extends Error {
  constructor(readonly refused: Refused) { super("back"); }
}

/**
 * One press of a clock, whoever it is from: resolves the person and the time, asks `decide` (which reads, judges and
 * writes), and answers. A live press that breaks a rule is refused. One that was kept on a tablet is never dropped: it is
 * written as a punch "to be checked" with the rule's own words, and moves no clock.
 */
export async function press(
  ctx: TxContext, stamp: Stamp, facts: PunchFacts,
  decide: (ctx: TxContext, acting: Acting, state: ClockState) => Promise<Result<readonly string[]>>,
): Promise<Result<Pressed>> {
  const who = await actingPerson(ctx, stamp);
  if (!who.ok) return who;
  const acting = who.value;
  const done = (flags: readonly string[], doubt: string | null) =>
    ok({ personId: acting.person.id, personName: acting.person.name, at: acting.at.toISOString(), flags: [...flags, ...acting.flags], doubt });
  const keep = async (doubt: string) => {
    await writePunch(ctx, acting, { ...facts, flags: [DOUBT], note: doubt });
    return done([DOUBT], doubt);
  };
  if (acting.doubt) return keep(acting.doubt);
  if (!acting.isLate) {
    const state = await clockState(ctx, acting.person.id);
    // Two tablets measure their offsets a little apart; a live press never lies before the one that was answered last.
    const at = new Date(Math.max(acting.at.getTime(), Math.min(ctx.now.getTime(), Math.max(state.bench?.startedAt.getTime() ?? 0, state.door.since?.getTime() ?? 0))));
    const result = await decide(ctx, { ...acting, at }, state);
    return result.ok ? done(result.value, null) : result;
  }
  if (await hasLaterTimes(ctx, acting.person.id, acting.at)) return keep("it lies before times that are known already");
  try {
    const flags = await ctx.tx.transaction(async (tx) => {
      const inner: TxContext = { ...ctx, tx };
      const result = await decide(inner, acting, await clockState(inner, acting.person.id));
      if (!result.ok) throw new Back(result);
      return result.value;
    });
    return done(flags, null);
  } catch (error) {
    if (error instanceof Back) return keep(error.refused.refusal.message);
    const rule = ruleOf(error);
    if (rule) return keep(rule.message);
    throw error;
  }
}
