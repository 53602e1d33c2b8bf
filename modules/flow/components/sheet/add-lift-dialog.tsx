"use client";
import { useState } from "react";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { addLiftAction, removeLiftAction } from "../../actions";
import type { RawTest } from "../../domain/raw-test";
import { addLiftInput } from "../../input";

/** The drafts a new lift goes to: `both` of the sheet, or one side's. */
export function liftTargets(drafts: readonly Pick<RawTest, "id" | "version" | "side">[], to: "both" | RawTest["side"]) {
  const [first, second] = drafts.filter((t) => to === "both" || t.side === to);
  if (!first) return null;
  return { testId: first.id, version: first.version, also: second ? { testId: second.id, version: second.version } : undefined };
}

interface Adding { drafts: readonly RawTest[]; settle: () => Promise<string | null>; onAdded: () => void }

function AddForm({ drafts, settle, onAdded }: Adding) {
  const { slug } = usePlace();
  const [to, setTo] = useState<"both" | RawTest["side"]>(drafts.length > 1 ? "both" : (drafts[0]?.side ?? "intake"));
  const unit = drafts[0]?.liftUnit ?? "in";
  const form = useCommandForm({
    schema: addLiftInput,
    defaultValues: { ...(liftTargets(drafts, "both") ?? { testId: "", version: 0 }), lift: "", reason: "" },
    action: async ({ requestId, input }) => {
      await settle();
      return addLiftAction(slug, { requestId, input });
    },
    onDone: onAdded,
  });
  const choose = (side: typeof to) => {
    const target = liftTargets(drafts, side);
    if (!target) return;
    setTo(side);
    form.rhf.setValue("testId", target.testId);
    form.rhf.setValue("version", target.version);
    form.rhf.setValue("also", target.also);
  };
  return (
    <CommandForm form={form} toFix="before the lift is added">
      <div className="fields">
        <TextInput name="lift" label="Lift" unit={unit} inputMode="decimal" hint="It takes its place on the ladder; what is read stays." />
        {drafts.length > 1 ? (
          <fieldset className="full flex flex-wrap gap-5">
            <legend className="label">On the sheet of</legend>
            {(["both", "intake", "exhaust"] as const).map((side) => (
              <label key={side} className="tick"><input type="radio" name="lift-side" checked={to === side} onChange={() => choose(side)} /><span className="capitalize">{side === "both" ? "Both sides" : side}</span></label>
            ))}
          </fieldset>
        ) : null}
        <TextInput name="reason" label="Reason" optional className="full" hint="Asked for when the ladder grows past 24 lifts." />
      </div>
      <div className="form-act"><SubmitButton pendingText="Adding…">Add the lift</SubmitButton><DialogClose>Leave the ladder</DialogClose></div>
    </CommandForm>
  );
}

/** One more lift on the drafts in hand. What is typed and not yet sent goes first (`settle`): the page is read again afterwards. */
export function AddLiftDialog({ drafts, settle, onAdded }: Adding) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog open={open} onOpenChange={setOpen} trigger={<button type="button" className="lk">Add a lift</button>} title="Add a lift">
      <AddForm drafts={drafts} settle={settle} onAdded={() => { setOpen(false); onAdded(); }} />
    </TaskDialog>
  );
}

/** Drafts that have this lift on the ladder and nothing read at it: what may be taken off. Null when some draft was read there. */
export function unreadAt(drafts: readonly RawTest[], liftUm: number) {
  const planned = drafts.filter((t) => t.lifts.some((l) => l.liftUm === liftUm));
  const isRead = planned.some((t) => t.lifts.length < 2 || t.cells.some((c) => c.liftUm === liftUm && c.valueText !== ""));
  return isRead ? null : liftTargets(planned, "both");
}

/** Takes the lift in hand off the ladder again, while nothing is read at it. */
export function RemoveLift({ drafts, liftUm, name, settle, onRemoved }: { drafts: readonly RawTest[]; liftUm: number; name: string; settle: () => Promise<string | null>; onRemoved: () => void }) {
  const { slug } = usePlace();
  const [pending, setPending] = useState(false);
  const [trouble, setTrouble] = useState("");
  const [requestId] = useState(() => crypto.randomUUID());
  const target = unreadAt(drafts, liftUm);
  if (!target) return null;
  const remove = async () => {
    setPending(true);
    await settle();
    const reply = await removeLiftAction(slug, { requestId, input: { ...target, liftUm } }).catch(() => null);
    setPending(false);
    if (reply?.status === "ok") onRemoved();
    else setTrouble(reply?.status === "refused" || reply?.status === "conflict" ? reply.message : "It could not be taken off. Try again in a moment.");
  };
  return (
    <p className="flex flex-wrap items-center gap-3 px-3.5 pb-3">
      <Button size="sm" variant="lo" pending={pending} pendingText="Taking it off…" onClick={() => void remove()}>{`Take ${name} off the ladder`}</Button>
      {trouble === "" ? null : <span role="alert" className="sm neg">{trouble}</span>}
    </p>
  );
}
