import { createContext } from "react";

/** The nonce of this response's content policy; empty in the browser, which hides it. */
export const NonceContext = createContext("");
