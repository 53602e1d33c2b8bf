"use server";
import { shopAction } from "@/modules/access/action";
import { saveMeasurements, setMeasurementLimit } from "./commands/measurements";

export const saveMeasurementsAction = shopAction(saveMeasurements);
export const setMeasurementLimitAction = shopAction(setMeasurementLimit);
