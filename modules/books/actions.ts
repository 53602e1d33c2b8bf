"use server";
import { shopAction } from "@/modules/access/action";
import { changeShopSettings } from "./settings";

export const changeShopSettingsAction = shopAction(changeShopSettings);
