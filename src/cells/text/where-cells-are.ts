import { createContext, useContext } from "react";

/** The address of a cell by its name, on the page that shows the text; none where cells have no place to go to. */
const WhereCellsAre = createContext<(name: string) => string | undefined>(() => undefined);

export const WhereCellsAreProvider = WhereCellsAre.Provider;
export const useWhereCellsAre = () => useContext(WhereCellsAre);
