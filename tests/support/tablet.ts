import type { ShopContext } from "@/modules/access/context";
import { deviceContext } from "@/modules/access/device";
import { addDevice, freshEnrolCode, makeEnrolCode } from "@/modules/time/commands/devices";
import { enrolTablet } from "@/modules/time/identity/enrol";
import { identify } from "@/modules/time/identity/identify";
import { must, type TestShop } from "./shop";

export interface Tablet {
  id: string;
  token: string;
  /** The tablet's context at an instant, asked anew from its token; throws when it is not let in. */
  at(iso: string, options?: { revokedToo?: boolean }): Promise<ShopContext>;
  /** A pass by badge. */
  pass(shortName: string, badge: string, iso: string): Promise<{ proof: { kind: "pass"; personId: string; pass: string } }>;
}

/** Enrols a tablet the way a manager does. */
export async function enrolledTablet(shop: TestShop, name = "Bench 2"): Promise<Tablet> {
  const mgr = { ...shop.as("mgr"), now: new Date() };
  const { id } = must(await addDevice(mgr, { name }));
  const code = freshEnrolCode();
  must(await makeEnrolCode(mgr, { id, code }));
  const { token } = must(await enrolTablet(code.toLowerCase(), { ip: name, agent: "test" }));
  const at = async (iso: string, options: { revokedToo?: boolean } = {}): Promise<ShopContext> => {
    const ctx = await deviceContext(token, undefined, options);
    if (!ctx) throw new Error("the tablet is not let in");
    return { ...ctx, now: new Date(iso) };
  };
  return {
    id, token, at,
    async pass(shortName, badge, iso) {
      const own = must(await identify(await at(iso), { kind: "badge", badge }));
      if (own.personId !== shop.people[shortName]) throw new Error("badge of somebody else");
      return { proof: { kind: "pass", personId: own.personId, pass: own.pass } };
    },
  };
}
