"use server";
import { shopAction } from "@/modules/access/action";
import { addCamshaft, addOwnHead, changeCamshaft, changeFamily, changeHeadWork, setUpFamily } from "./commands/families";
import { addCheckPlate, addLiftDevice, changeBench, changeCheckPlate, changeFixture, changeLiftDevice, setUpBench, setUpFixture } from "./commands/gear-set-up";

export const setUpBenchAction = shopAction(setUpBench);
export const changeBenchAction = shopAction(changeBench);
export const addCheckPlateAction = shopAction(addCheckPlate);
export const changeCheckPlateAction = shopAction(changeCheckPlate);
export const setUpFixtureAction = shopAction(setUpFixture);
export const changeFixtureAction = shopAction(changeFixture);
export const addLiftDeviceAction = shopAction(addLiftDevice);
export const changeLiftDeviceAction = shopAction(changeLiftDevice);
export const addCamshaftAction = shopAction(addCamshaft);
export const changeCamshaftAction = shopAction(changeCamshaft);
export const setUpFamilyAction = shopAction(setUpFamily);
export const changeFamilyAction = shopAction(changeFamily);
export const addOwnHeadAction = shopAction(addOwnHead);
export const changeHeadWorkAction = shopAction(changeHeadWork);
