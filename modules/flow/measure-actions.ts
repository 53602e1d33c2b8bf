"use server";
import { shopAction } from "@/modules/access/action";
import { setMeasurementLimit } from "./commands/measurements";

export const setMeasurementLimitAction = shopAction(setMeasurementLimit);
