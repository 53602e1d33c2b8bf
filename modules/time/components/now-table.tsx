"use client";

import { useQuery } from "@tanstack/react-query";
import { time } from "@/modules/kernel/format";
import { getJson } from "@/modules/ui/fetch-json";
import { Flag } from "@/modules/ui/flag";
import { usePlace } from "@/modules/ui/place";
import { Status } from "@/modules/ui/status";
import { Tag } from "@/modules/ui/tag";
import { TextLink } from "@/modules/ui/text-link";
import type { PersonNow } from "../queries/people-at";
import { capital, spell } from "../tablet/words";

/** Who is in, on what, since when; looked at anew every fifteen seconds. */
export function NowTable({ initial, linksToSheets }: { initial: PersonNow[]; linksToSheets: boolean }) {
  const place = usePlace();
  const { data, isError, dataUpdatedAt } = useQuery({ queryKey: ["time-now", place.slug], queryFn: ({ signal }) => getJson<PersonNow[]>(`/api/v1/s/${place.slug}/time/now`, {}, signal), initialData: initial, refetchInterval: 15_000 });
  return (
    <>
      <table>
        <caption className="sr-only">Who is in now</caption>
        <thead><tr><th scope="col">Person</th><th scope="col">Door</th><th scope="col">On</th><th scope="col" className="r w2">Since</th><th scope="col" className="r">Today</th></tr></thead>
        <tbody>
          {data.map((p) => (
            <tr key={p.personId}>
              <td className="b">{linksToSheets ? <TextLink href={`/s/${place.slug}/time?person=${p.personId}`}>{p.shortName}</TextLink> : p.shortName}</td>
              <td>{p.isOutMissing ? <Flag>No out</Flag> : p.isIn ? <Status dial="work">In {p.inSince ? time(p.inSince, place) : ""}</Status> : <Status dial="queue" dim>Out</Status>}</td>
              <td>{p.on ? <span className="inline-flex flex-wrap items-center gap-x-2 gap-y-1">{p.on.tag ? <Tag running>{p.on.tag}</Tag> : null}{capital(p.on.words)}</span> : p.isIn ? <span className="mid">Nothing running</span> : null}</td>
              <td className="r q w2">{p.on ? time(p.on.since, place) : ""}</td>
              <td className="r q">{p.todayMinutes > 0 ? spell(p.todayMinutes) : ""}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {isError ? <p className="mid sm mt-2" role="status">No link just now; {dataUpdatedAt ? `this is as of ${time(new Date(dataUpdatedAt), place)}` : "this is as the page was opened"}.</p> : null}
    </>
  );
}
