"use client";

import { useRouter } from "next/navigation";
import { useId, useState } from "react";
import { RequestIds } from "@/modules/ui/form/request-id";
import { usePlace } from "@/modules/ui/place";
import type { FileView } from "@/modules/documents/files";

/** Photographs of the paper sheet, and the files readings came from. */
export function UploadPhotos({ headId, photos, files, mayAdd }: { headId: string; photos: readonly FileView[]; files: readonly FileView[]; mayAdd: boolean }) {
  const { slug } = usePlace();
  const router = useRouter();
  const id = useId();
  const [said, setSaid] = useState("");
  const [ids] = useState(() => new RequestIds());
  const send = async (list: FileList | null) => {
    let kept = 0;
    for (const photo of list ?? []) {
      const form = new FormData();
      form.set("photo", photo);
      form.set("head", headId);
      setSaid(`Sending ${photo.name}…`);
      const what = `${photo.name} ${photo.size} ${photo.lastModified}`;
      try {
        const response = await fetch(`/api/v1/s/${slug}/flow/upload`, { method: "POST", body: form, headers: { "idempotency-key": ids.take(what) } });
        if (response.status < 500) ids.settle(what);
        if (!response.ok) { const body = (await response.json()) as { title?: string }; setSaid(`${photo.name} was not kept. ${body.title ?? ""}`); return; }
        kept += 1;
      } catch { setSaid(`${photo.name} was not sent: no link. It is still on your device.`); return; }
    }
    setSaid(kept === 0 ? "" : `${kept} photograph${kept === 1 ? "" : "s"} kept.`);
    router.refresh();
  };
  return (
    <>
      {photos.length === 0 ? <p className="mid">No photograph of a paper sheet yet.</p> : (
        <ul className="flex flex-wrap gap-3">{photos.map((p) => (
          <li key={p.id}>
            <a className="lk" href={`/api/v1/s/${slug}/files/${p.id}`}>
              {/* eslint-disable-next-line @next/next/no-img-element -- a file of the shop behind its own sign-in */}
              <img className="photo h-28" src={`/api/v1/s/${slug}/files/${p.id}?thumb`} alt={`Sheet, ${p.name}`} />
            </a>
          </li>
        ))}</ul>
      )}
      {files.length === 0 ? null : <ul className="mt-3">{files.map((f) => <li key={f.id}><a className="lk" href={`/api/v1/s/${slug}/files/${f.id}`}>{f.name}</a> <span className="dim sm">{f.note}</span></li>)}</ul>}
      {mayAdd ? <div className="mt-3"><label className="label" htmlFor={id}>Add photographs of the sheet</label><input id={id} type="file" accept="image/jpeg,image/png,image/webp" multiple onChange={(e) => void send(e.target.files)} /></div> : null}
      <p role="status" className="hint">{said}</p>
    </>
  );
}
