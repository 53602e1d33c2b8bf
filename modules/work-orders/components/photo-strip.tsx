"use client";

import { useRouter } from "next/navigation";
import { useId, useRef, useState } from "react";
import { Icon } from "@/modules/ui/icon";
import { usePlace } from "@/modules/ui/place";
import { Tube } from "@/modules/ui/tube";

interface Sending { key: string; file: File; percent: number; trouble: string | null }

const AT_ONCE = 2;

/** Sends one photo as a raw body, telling how far it is. Resolves to null, or what went wrong in words. */
function sendPhoto(slug: string, subject: { kind: "piece" | "finding"; id: string }, file: File, onProgress: (percent: number) => void): Promise<string | null> {
  return new Promise((resolve) => {
    const search = new URLSearchParams({ subjectKind: subject.kind, subjectId: subject.id, name: file.name.slice(0, 180) });
    const request = new XMLHttpRequest();
    request.open("POST", `/api/v1/s/${slug}/files?${search}`);
    request.setRequestHeader("content-type", "application/octet-stream");
    request.upload.onprogress = (e) => { if (e.lengthComputable) onProgress(Math.round((e.loaded / e.total) * 100)); };
    request.onload = () => {
      if (request.status === 200) return resolve(null);
      try {
        resolve((JSON.parse(request.responseText) as { title?: string }).title ?? "The photo was not taken.");
      } catch {
        resolve("The photo was not taken. Send it again.");
      }
    };
    request.onerror = () => resolve("No link to the shop. The photo is still on this device.");
    request.ontimeout = request.onerror;
    request.timeout = 120_000;
    request.send(file);
  });
}

/**
 * Photos of a piece or finding: the ones on file, the ones on their way with how far they are, and what went wrong with
 * which one. A phone offers its camera. What did not go stays in the strip and can be sent again.
 */
export function PhotoStrip({ subject, photoIds, label, mayAdd, wanted }: { subject: { kind: "piece" | "finding"; id: string }; photoIds: readonly string[]; label: string; mayAdd: boolean; wanted?: number }) {
  const { slug } = usePlace();
  const router = useRouter();
  const input = useRef<HTMLInputElement>(null);
  const id = useId();
  const [sending, setSending] = useState<Sending[]>([]);
  const set = (key: string, change: Partial<Sending>) => setSending((all) => all.map((s) => (s.key === key ? { ...s, ...change } : s)));

  const send = async (list: readonly Sending[]) => {
    const queue = [...list];
    const lane = async () => {
      for (let next = queue.shift(); next; next = queue.shift()) {
        const { key, file } = next;
        set(key, { percent: 0, trouble: null });
        const trouble = await sendPhoto(slug, subject, file, (percent) => set(key, { percent }));
        if (trouble === null) setSending((all) => all.filter((s) => s.key !== key));
        else set(key, { trouble });
      }
    };
    await Promise.all(Array.from({ length: AT_ONCE }, lane));
    router.refresh();
  };
  const pick = (files: FileList | null) => {
    const fresh = [...(files ?? [])].map((file): Sending => ({ key: crypto.randomUUID(), file, percent: 0, trouble: null }));
    if (input.current) input.current.value = "";
    setSending((all) => [...all, ...fresh]);
    void send(fresh);
  };
  const going = sending.filter((s) => s.trouble === null);
  return (
    <div>
      <ul className="flex flex-wrap gap-2" aria-label={label}>
        {photoIds.map((p, i) => (
          <li key={p}><a className="photo" href={`/api/v1/s/${slug}/files/${p}`} target="_blank" rel="noopener" aria-label={`${label} ${i + 1}, opens in a new tab`}>
            {/* Thumbnails are our own files behind the session; the framework's optimiser stays closed. */}
            {/* eslint-disable-next-line @next/next/no-img-element */}
            <img src={`/api/v1/s/${slug}/files/${p}?thumb=1`} alt="" loading="lazy" width={104} height={70} />
          </a></li>
        ))}
        {going.map((s) => <li key={s.key} className="photo" style={{ padding: "0 8px" }}><Tube progress value={s.percent} mark={100} label={`Sending ${s.file.name}`} /></li>)}
        {mayAdd ? (
          <li>
            <label htmlFor={id} className="photo" style={{ cursor: "pointer", borderStyle: "dashed" }}>
              <Icon name="cam" size={22} /><span className="sm">Add photos</span>
            </label>
            <input ref={input} id={id} className="sr-only" type="file" accept="image/jpeg,image/png,image/webp,image/heic" capture="environment" multiple onChange={(e) => pick(e.target.files)} />
          </li>
        ) : null}
      </ul>
      <p className="sm dim mt-2" role="status">
        {going.length > 0 ? `Sending ${going.length}. Stay on this page.` : wanted !== undefined && photoIds.length < wanted ? `${photoIds.length} of ${wanted} usual: both faces, the ports, any damage.` : photoIds.length === 0 && !mayAdd ? "No photos." : ""}
      </p>
      {sending.filter((s) => s.trouble !== null).map((s) => (
        <p key={s.key} className="err" role="alert">
          <Icon name="warn" size={16} />
          <span>{s.file.name}: {s.trouble} <button type="button" className="lk" onClick={() => void send([s])}>Send again</button> <button type="button" className="lk" onClick={() => setSending((all) => all.filter((x) => x.key !== s.key))}>Leave it out</button></span>
        </p>
      ))}
    </div>
  );
}
