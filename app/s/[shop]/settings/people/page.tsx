import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { AddPersonForm } from "@/modules/time/components/person-forms";
import { roleWords } from "@/modules/time/role-words";
import { peopleList } from "@/modules/time/queries/settings-lists";
import { Bay } from "@/modules/ui/bay";
import { Flag } from "@/modules/ui/flag";
import { TextLink } from "@/modules/ui/text-link";
import { SettingsHead } from "../settings-head";

export const metadata = { title: "People" };

export default async function PeoplePage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "devices.write");
  const people = await peopleList(ctx);
  const list = (
    <Bay label="People" flush>
      <table>
        <caption className="sr-only">People of the shop</caption>
        <thead><tr><th scope="col">Name</th><th scope="col" className="w2">Roles</th><th scope="col">Clock</th><th scope="col" className="w2">Office</th></tr></thead>
        <tbody>
          {people.map((p) => (
            <tr key={p.id}>
              <td className="b"><TextLink href={`/s/${ctx.shop.slug}/settings/people/${p.id}`}>{p.name}</TextLink>{p.leftAt ? <span className="mid"> · has left</span> : null}</td>
              <td className="w2 mid">{roleWords(p.roles)}</td>
              <td>{p.leftAt ? "" : p.pin === "dead" ? <Flag>PIN dead</Flag> : [p.hasBadge ? "badge" : "", p.pin === "set" ? "PIN" : ""].filter(Boolean).join(", ") || <span className="mid">none</span>}</td>
              <td className="w2">{p.hasSignIn ? "Signs in" : <span className="mid">no</span>}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </Bay>
  );
  return (
    <main id="main" className="page">
      <SettingsHead ctx={ctx} current="people" title="People" sub={`${people.filter((p) => !p.leftAt).length} work here`} />
      {ableTo(ctx, "people.write") ? <div className="split">{list}<Bay label="Add a person"><AddPersonForm /></Bay></div> : list}
    </main>
  );
}
