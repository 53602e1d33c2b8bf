"use server";
import { shopAction } from "@/modules/access/action";
import { recordEpoxyFill } from "./commands/epoxy";
import { dropNeed, issueAllReady, issueToWorkOrder, needPart, returnUnused } from "./commands/parts";

export const issueToWorkOrderAction = shopAction(issueToWorkOrder);
export const issueAllReadyAction = shopAction(issueAllReady);
export const returnUnusedAction = shopAction(returnUnused);
export const needPartAction = shopAction(needPart);
export const dropNeedAction = shopAction(dropNeed);
export const recordEpoxyFillAction = shopAction(recordEpoxyFill);
