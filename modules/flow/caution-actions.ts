"use server";
import { shopAction } from "@/modules/access/action";
import { markCautionsSeen } from "./commands/job-cautions";

export const markCautionsSeenAction = shopAction(markCautionsSeen);
