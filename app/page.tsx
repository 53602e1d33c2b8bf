import { redirect } from "next/navigation";
import { shopsOf, signedIn } from "@/modules/access/session";

/** The front door: to the one shop, to a choice of several, or to sign-in. */
export default async function FrontDoor() {
  const user = await signedIn();
  if (!user) redirect("/sign-in");
  const shops = await shopsOf(user.userId);
  const [only] = shops;
  if (shops.length === 1 && only) redirect(`/s/${only.slug}`);
  return (
    <main id="main" className="page">
      <h1 className="mb-4 font-cut text-h1">Which shop?</h1>
      <ul>
        {shops.map((s) => (
          <li key={s.id}><a className="lk" href={`/s/${s.slug}`}>{s.name}</a></li>
        ))}
      </ul>
      {shops.length === 0 ? <p>You do not work in any shop here yet. Ask its owner to add you.</p> : null}
    </main>
  );
}
