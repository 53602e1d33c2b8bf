"use server";
import { shopAction } from "@/modules/access/action";
import { showFlowEstimates } from "./commands/show-estimates";

export const showFlowEstimatesAction = shopAction(showFlowEstimates);
