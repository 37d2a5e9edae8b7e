import { createContext } from "react";

/** Whether the drawing is looked at from so far that only names can be read. */
export const FarContext = createContext(false);
