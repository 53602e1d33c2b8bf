"use server";
import { shopAction } from "@/modules/access/action";
import { addLift, changeSheetConditions, removeLift } from "./commands/change-test";
import { completeTest, correctTest, voidTest } from "./commands/finish-test";
import { recordBenchCheck } from "./commands/gear";
import { issueComparison } from "./commands/issue-comparison";
import { startSheet } from "./commands/start-test";

export const recordBenchCheckAction = shopAction(recordBenchCheck);
export const startSheetAction = shopAction(startSheet);
export const changeSheetConditionsAction = shopAction(changeSheetConditions);
export const addLiftAction = shopAction(addLift);
export const removeLiftAction = shopAction(removeLift);
export const completeTestAction = shopAction(completeTest);
export const voidTestAction = shopAction(voidTest);
export const correctTestAction = shopAction(correctTest);
export const issueComparisonAction = shopAction(issueComparison);
