"use server";
import { shopAction } from "@/modules/access/action";
import { addLift, changeSheetConditions } from "./commands/change-test";
import { completeTest, correctTest, voidTest } from "./commands/finish-test";
import { addBench, addFamily, addFixture, recordBenchCheck } from "./commands/gear";
import { issueComparison } from "./commands/issue-comparison";
import { startSheet } from "./commands/start-test";

export const addBenchAction = shopAction(addBench);
export const addFixtureAction = shopAction(addFixture);
export const addFamilyAction = shopAction(addFamily);
export const recordBenchCheckAction = shopAction(recordBenchCheck);
export const startSheetAction = shopAction(startSheet);
export const changeSheetConditionsAction = shopAction(changeSheetConditions);
export const addLiftAction = shopAction(addLift);
export const completeTestAction = shopAction(completeTest);
export const voidTestAction = shopAction(voidTest);
export const correctTestAction = shopAction(correctTest);
export const issueComparisonAction = shopAction(issueComparison);
