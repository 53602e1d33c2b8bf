"use server";
import { shopAction } from "@/modules/access/action";
import { setFlowLimits } from "./commands/set-limits";

export const setFlowLimitsAction = shopAction(setFlowLimits);
