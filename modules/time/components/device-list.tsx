"use client";

import { useRouter } from "next/navigation";
import { useRef, useState } from "react";
import { useWatch } from "react-hook-form";
import { dateTime, time } from "@/modules/kernel/format";
import { Bay } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { ConfirmDialog } from "@/modules/ui/dialog";
import { EmptyState } from "@/modules/ui/empty-state";
import { CommandForm } from "@/modules/ui/form/command-form";
import { RadioRow } from "@/modules/ui/form/radio-row";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { Status } from "@/modules/ui/status";
import { addDeviceAction, makeEnrolCodeAction, revokeDeviceAction } from "../actions";
import { codeFrom } from "../domain/enrol-letters";
import { newDeviceInput } from "../device-input";
import { BenchTokenPlate, MakeToken, newBenchToken, type ShownToken } from "./bench-token";
import type { DeviceRow } from "../queries/settings-lists";

const DIAL = { enrolled: "ready", "waits for its code": "wait", "not enrolled": "draft", "out of use": "late" } as const;
const BENCH_WORD = { enrolled: "Has its token", "waits for its code": "No token yet", "not enrolled": "No token yet", "out of use": "Out of use" } as const;
const WORD = { enrolled: "Enrolled", "waits for its code": "Waits for its code", "not enrolled": "Not enrolled", "out of use": "Out of use" } as const;

/** The shop's tablets and bench computers. A tablet's code is shown once, here, and works for ten minutes; so is a bench computer's token. */
export function DeviceList({ devices }: { devices: readonly DeviceRow[] }) {
  const place = usePlace();
  const router = useRouter();
  const [code, setCode] = useState<{ name: string; code: string; until: string } | null>(null);
  const [token, setToken] = useState<ShownToken | null>(null);
  const [said, setSaid] = useState<string | null>(null);
  const makeCode = async (id: string) => {
    // Made here and sent along, so that it is in nothing the server answers or writes down.
    const fresh = codeFrom(crypto.getRandomValues(new Uint8Array(64)));
    setSaid(null);
    setToken(null);
    const reply = await makeEnrolCodeAction(place.slug, { requestId: crypto.randomUUID(), input: { id, code: fresh } }).catch(() => null);
    if (reply?.status === "ok") { setCode({ name: reply.value.name, code: fresh, until: reply.value.expires }); router.refresh(); }
    else setSaid(reply?.status === "refused" ? reply.message : "No code was made. Try again.");
  };
  const show = (made: ShownToken | string) => {
    setCode(null);
    setToken(typeof made === "string" ? null : made);
    setSaid(typeof made === "string" ? made : null);
    router.refresh();
  };
  const form = useCommandForm({
    schema: newDeviceInput, defaultValues: { name: "", kind: "clock" }, action: (sent) => addDeviceAction(place.slug, sent),
    onDone: (v) => {
      const isBench = form.rhf.getValues("kind") === "bench";
      form.rhf.reset({ name: "", kind: "clock" });
      if (isBench) void newBenchToken(place.slug, v.id).then(show);
      else void makeCode(v.id);
    },
  });
  const kind = useWatch({ control: form.rhf.control, name: "kind" });
  return (
    <div className="split">
      <Bay label="Tablets and bench computers" flush>
        {code ? (
          <div className="plate mx-[18px] mb-4" role="status">
            <p>Open <b>/clock</b> on <b>{code.name}</b> and type</p>
            <p className="num n-l" style={{ letterSpacing: "0.06em" }}>{code.code}</p>
            <p className="mid">Once, until {time(code.until, place)}. It is not shown again.</p>
          </div>
        ) : null}
        {token ? <BenchTokenPlate shown={token} onPutAway={() => setToken(null)} /> : null}
        {said ? <Note tone="stop" live title={said} className="mb-4" /> : null}
        {devices.length === 0 ? <EmptyState title="No tablets yet" level={3}>Name one at the right; a clock gets a code to type, a bench computer a token to copy.</EmptyState> : (
          <table>
            <caption className="sr-only">Tablets and bench computers of the shop</caption>
            <thead><tr><th scope="col">Name</th><th scope="col" className="w2">For</th><th scope="col">State</th><th scope="col" className="w2">Last seen</th><th scope="col"><span className="sr-only">Acts</span></th></tr></thead>
            <tbody>
              {devices.map((d) => (
                <tr key={d.id}>
                  <td className="b">{d.name}</td>
                  <td className="w2">{d.kind === "clock" ? "Shop clock" : "Flow bench"}</td>
                  <td><Status dial={DIAL[d.state]} dim={d.state === "out of use"}>{(d.kind === "bench" ? BENCH_WORD : WORD)[d.state]}</Status></td>
                  <td className="w2 q">{d.lastSeenAt ? dateTime(d.lastSeenAt, place) : ""}</td>
                  <td className="r">
                    <span className="inline-flex flex-wrap justify-end gap-2">
                      {d.kind === "bench" ? (d.state === "out of use" ? null : <MakeToken device={{ id: d.id, name: d.name, hasToken: d.state === "enrolled" }} onShown={show} onRefused={show} />)
                        : d.state === "waits for its code" || d.state === "not enrolled" ? <Button size="sm" onClick={() => void makeCode(d.id)}>New code</Button> : null}
                      {d.state === "out of use" ? null : <Revoke device={d} />}
                    </span>
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        )}
      </Bay>
      <Bay label="Add a tablet or bench computer">
        <CommandForm form={form} toFix="before it is added">
          <div className="fields one">
            <TextInput name="name" label="Name, by its place" hint="Such as Bench 2 or Back door" autoComplete="off" />
            <RadioRow name="kind" label="For" down options={[{ value: "clock", label: "Shop clock", detail: "times only; a code to type" }, { value: "bench", label: "Flow bench computer", detail: "readings only; a token to copy" }]} />
          </div>
          <div className="form-act"><SubmitButton pendingText="Adding…">{kind === "bench" ? "Add and make a token" : "Add and make a code"}</SubmitButton></div>
        </CommandForm>
      </Bay>
    </div>
  );
}

function Revoke({ device }: { device: DeviceRow }) {
  const { slug } = usePlace();
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const [pending, setPending] = useState(false);
  const id = useRef(crypto.randomUUID());
  const end = async () => {
    setPending(true);
    await revokeDeviceAction(slug, { requestId: id.current, input: { id: device.id } }).catch(() => null);
    setPending(false);
    setOpen(false);
    router.refresh();
  };
  return (
    <ConfirmDialog trigger={<Button size="sm" variant="lo">Put out of use</Button>} open={open} onOpenChange={setOpen} question={`Put ${device.name} out of use?`} safe="Keep it" action="Put out of use" pending={pending} pendingText="Ending…" onAction={() => void end()}>
      Its token ends at once. {device.kind === "bench" ? "What it sent stays." : "Times it kept without a link may still arrive; they are looked at before they count."}
    </ConfirmDialog>
  );
}
