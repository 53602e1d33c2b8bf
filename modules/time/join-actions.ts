"use server";
import { secretAction } from "@/modules/access/action";
import { acceptInvitation } from "./commands/join";
import { invitationContext } from "./identity/invitation";

export const acceptInvitationAction = secretAction(acceptInvitation, invitationContext);
