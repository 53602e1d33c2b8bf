import type { Metadata } from "next";
import { allowed } from "@/modules/access/rate-limit";
import { requestFacts } from "@/modules/access/session";
import { JoinForm } from "@/modules/time/components/join-form";
import { openInvitation } from "@/modules/time/identity/invitation";

export const metadata: Metadata = { title: "Invitation", referrer: "no-referrer" };

/** Where an invited person sets a password. Opening it changes nothing. */
export default async function JoinPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const { ip } = await requestFacts();
  const invited = (await allowed(`join:${ip}`, 30, 60)) ? await openInvitation(decodeURIComponent(token)) : null;
  return (
    <main id="main" className="page no-rail mx-auto max-w-[560px]">
      {invited ? (
        <>
          <h1 className="mb-2 font-cut text-h2 font-bold">Welcome to {invited.ctx.shop.name}, {invited.name}</h1>
          <p className="mid mb-6">You will sign in with {invited.email}. Choose a password that only you know.</p>
          <JoinForm token={token} email={invited.email} />
        </>
      ) : (
        <>
          <h1 className="mb-2 font-cut text-h2 font-bold">This invitation is not good any more</h1>
          <p className="mid">It works once and for three days. Ask the owner of the shop for a new one.</p>
        </>
      )}
    </main>
  );
}
