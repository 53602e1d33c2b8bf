import { guardedBy } from "@/modules/access/page";

export default guardedBy("books.see");
