import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { isUuid } from "@/modules/kernel/id";
import { localDate } from "@/modules/kernel/instant";
import { notFound } from "next/navigation";
import { InvitationBay } from "@/modules/time/components/invitation-bay";
import { LeaveButton } from "@/modules/time/components/leave-button";
import { ChangePersonForm, ClockKeys, RatesBay } from "@/modules/time/components/person-forms";
import { roleWords } from "@/modules/time/role-words";
import { invitationFor } from "@/modules/time/identity/invitation";
import { getPerson } from "@/modules/time/queries/settings-lists";
import { Bay, Bays } from "@/modules/ui/bay";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Person" };

export default async function PersonPage({ params }: { params: Promise<{ shop: string; id: string }> }) {
  const ctx = await shopPage(params, "devices.write");
  const { id } = await params;
  if (!isUuid(id)) notFound();
  const person = await orNotFound(getPerson(ctx, id));
  const mayWrite = ableTo(ctx, "people.write");
  const isSelf = ctx.actor.kind === "person" && ctx.actor.id === id;
  return (
    <main id="main" className="page">
      <PageHead title={person.name} sub={person.leftAt ? "Has left" : roleWords(person.roles)} actions={mayWrite && !isSelf && !person.leftAt ? <LeaveButton id={id} name={person.shortName} /> : undefined} />
      <div className="split">
        <Bays>
          {mayWrite && !person.leftAt ? <Bay label="Person"><ChangePersonForm key={person.version} person={person} /></Bay> : null}
          {person.rates ? <RatesBay personId={id} rates={person.rates} today={localDate(ctx.now, ctx.shop.zone)} mayWrite={ableTo(ctx, "pay.write") && !person.leftAt} /> : null}
        </Bays>
        <Bays>
          {person.leftAt ? null : <ClockKeys person={person} />}
          {mayWrite && !person.leftAt ? <InvitationBay hasSignIn={person.hasSignIn} email={person.email} invitation={person.hasSignIn || !person.email ? null : invitationFor(ctx, person)} /> : null}
        </Bays>
      </div>
    </main>
  );
}
