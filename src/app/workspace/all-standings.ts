import { createContext, useContext } from "react";
import type { Standing } from "./standing.ts";

const AllStandings = createContext<readonly Standing[]>([]);

/** Where the other cells of the study stand, for what speaks of several: a text and the numbers it quotes. */
export const AllStandingsProvider = AllStandings.Provider;
export const useAllStandings = () => useContext(AllStandings);
