declare const idBrand: unique symbol;
/** Ids are random UUIDs, branded by the thing they name so that one cannot be passed for another. */
export type Id<T extends string> = string & { readonly [idBrand]: T };
export type ShopId = Id<"shop">;
export type PersonId = Id<"person">;

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;
export const isUuid = (text: string): boolean => UUID.test(text);
