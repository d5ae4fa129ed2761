import { useMutation } from "@tanstack/react-query";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** A link goes to the address; the answer is the same whatever it belongs to. */
const askAccount = (body: { email: string }) => ask({ method: "POST", path: api.accountLinks, body });

export const useAskAccount = () => useMutation({ mutationFn: askAccount });
