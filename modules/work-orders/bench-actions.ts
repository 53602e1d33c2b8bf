"use server";
import { shopAction } from "@/modules/access/action";
import { operationDone, reopenOperation, startOperation, switchTo } from "./commands/bench-clock";

export const startOperationAction = shopAction(startOperation);
export const switchToAction = shopAction(switchTo);
export const operationDoneAction = shopAction(operationDone);
export const reopenOperationAction = shopAction(reopenOperation);
