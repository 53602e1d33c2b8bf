import { guardedBy } from "@/modules/access/page";

export default guardedBy("customers.see");
