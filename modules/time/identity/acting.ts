import "server-only";
import { and, eq } from "drizzle-orm";
import { people } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import type { Role } from "@/modules/access/roles";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { punchTime } from "../domain/punch-time";
import { personOfPass } from "./pass";
import { checkPin } from "./pin";
import { openSeal } from "./seal";

const MS_OF_CENTURY = 100 * 366 * 86_400_000;

/**
 * Who is pressing, beside the tablet's own token: a pass the server gave after a badge or PIN, or, made without a link,
 * a badge or PIN sealed to the server for this one act.
 */
const proofInput = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("pass"), personId: z.uuid(), pass: z.string().max(300) }),
  z.strictObject({ kind: z.literal("sealed"), personId: z.uuid(), box: z.string().max(2000) }),
]);
export type Proof = z.infer<typeof proofInput>;

/** Sent with every punch. A signed-in person sends none of it: they act for themselves, now. */
export const stampInput = {
  proof: proofInput.optional(),
  /** The tablet's own clock at the tap, the offset it measured (server less tablet), its running number and the act's id. */
  deviceAt: z.iso.datetime({ offset: true }).optional(),
  /** Any: a tablet whose battery died may believe in another century, and its presses must not be lost for it. */
  offsetMs: z.number().int().min(-MS_OF_CENTURY).max(MS_OF_CENTURY).nullish(),
  counter: z.number().int().min(0).optional(),
  actId: z.uuid().optional(),
};
export type Stamp = z.output<z.ZodObject<typeof stampInput>>;

export interface Acting {
  readonly person: { readonly id: string; readonly name: string; readonly roles: readonly Role[] };
  readonly at: Date;
  readonly deviceAt: Date | null;
  readonly deviceId: string | null;
  readonly source: "tablet" | "offline" | "desk";
  /** Kept on a tablet: a rule that speaks against it flags it instead of refusing it. */
  readonly isLate: boolean;
  readonly flags: readonly string[];
  /** Why it does not count before somebody looked at it, or null. */
  readonly doubt: string | null;
}

/** Resolves the person behind an act and when it counts. Refuses `PROOF_NEEDED`, `PROOF_OVER`. */
export async function actingPerson(ctx: TxContext, stamp: Stamp): Promise<Result<Acting>> {
  if (ctx.actor.kind === "person") {
    const person = await personOf(ctx, ctx.actor.id);
    const { at } = punchTime({ now: ctx.now, deviceAt: null, offsetMs: null });
    return person && !person.hasLeft ? ok({ person, at, deviceAt: null, deviceId: null, source: "desk", isLate: false, flags: [], doubt: null }) : gone();
  }
  if (ctx.actor.kind !== "device" || !stamp.proof) return refuse("PROOF_NEEDED", "Hold your badge to the reader or type your PIN first.");
  const deviceAt = stamp.deviceAt ? new Date(stamp.deviceAt) : null;
  const time = punchTime({ now: ctx.now, deviceAt, offsetMs: stamp.offsetMs ?? null });
  const person = await personOf(ctx, stamp.proof.personId);
  if (!person || (person.hasLeft && !time.isLate)) return gone();
  const isRevoked = !ctx.actor.acts.includes("clock.use");
  const proven = await prove(ctx, ctx.actor.id, stamp, time.at);
  // A wrong sealed PIN is counted, and the count must not be taken back with a refusal: such a press is kept to be checked.
  if (!proven && !time.isLate && !isRevoked && stamp.proof.kind === "pass") return refuse("PROOF_OVER", "The screen was open too long. Hold your badge to the reader or type your PIN again.");
  const doubt = isRevoked ? "the tablet was put out of use" : !proven ? "badge or PIN did not match" : person.hasLeft ? "the person has left the shop" : time.flags.includes("very late") ? "kept for more than 14 days" : null;
  return ok({
    person, at: time.at, deviceAt, deviceId: ctx.actor.id, source: time.isLate ? "offline" : "tablet", isLate: time.isLate || isRevoked, flags: time.flags, doubt,
  });
}

const gone = () => refuse("NOT_KNOWN", "Badge not known here. Ask the manager.");

async function personOf(ctx: TxContext, id: string): Promise<(Acting["person"] & { hasLeft: boolean }) | null> {
  // The row's lock puts one person's punches in line, from however many tablets they come.
  const [p] = await ctx.tx.select({ id: people.id, name: people.shortName, roles: people.roles, leftAt: people.leftAt }).from(people)
    .where(and(eq(people.shopId, ctx.shop.id), eq(people.id, id))).for("update");
  return p ? { id: p.id, name: p.name, roles: p.roles as Role[], hasLeft: p.leftAt !== null } : null;
}

const sealedText = z.union([
  z.strictObject({ actId: z.uuid(), pin: z.string().max(20) }),
  z.strictObject({ actId: z.uuid(), badge: z.string().max(100) }),
]);

async function prove(ctx: TxContext, deviceId: string, stamp: Stamp, at: Date): Promise<boolean> {
  const { proof } = stamp;
  if (!proof) return false;
  if (proof.kind === "pass") return personOfPass(proof.pass, deviceId, at) === proof.personId;
  const text = openSeal(proof.box);
  if (text === null) return false;
  let inside: z.infer<typeof sealedText>;
  try {
    inside = sealedText.parse(JSON.parse(text));
  } catch {
    return false;
  }
  // A sealed proof is good for the one act it was made for.
  if (inside.actId !== stamp.actId) return false;
  if ("pin" in inside) return (await checkPin(ctx, proof.personId, inside.pin)).ok;
  const [owner] = await ctx.tx.select({ id: people.id }).from(people).where(and(eq(people.shopId, ctx.shop.id), eq(people.badgeCode, inside.badge)));
  return owner?.id === proof.personId;
}
