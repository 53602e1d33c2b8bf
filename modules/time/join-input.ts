import { z } from "@/modules/kernel/zod";
import { passwordProblem } from "./domain/password-rules";

export const joinInput = z.strictObject({
  token: z.string().max(300),
  password: z.string().max(1024).superRefine((password, ctx) => {
    const problem = passwordProblem(password);
    if (problem) ctx.addIssue({ code: "custom", message: problem });
  }),
});
