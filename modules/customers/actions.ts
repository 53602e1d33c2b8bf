"use server";
import { shopAction } from "@/modules/access/action";
import { addCustomer, changeCustomer } from "./commands";

export const addCustomerAction = shopAction(addCustomer);
export const changeCustomerAction = shopAction(changeCustomer);
