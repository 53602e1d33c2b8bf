"use server";
import { shopAction } from "@/modules/access/action";
import { openStock, reverseMovement, scrapStock } from "./commands/adjust";
import { countStock } from "./commands/count";
import { addPart, changePart, setKit } from "./commands/parts";

export const addPartAction = shopAction(addPart);
export const changePartAction = shopAction(changePart);
export const setKitAction = shopAction(setKit);
export const openStockAction = shopAction(openStock);
export const countStockAction = shopAction(countStock);
export const scrapStockAction = shopAction(scrapStock);
export const reverseMovementAction = shopAction(reverseMovement);
