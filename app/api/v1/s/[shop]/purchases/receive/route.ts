import { handle } from "@/modules/access/api";
import { receiveGoodsEndpoint } from "@/modules/purchasing/write-endpoints";

export const POST = handle(receiveGoodsEndpoint);
