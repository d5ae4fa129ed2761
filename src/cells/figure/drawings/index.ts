import type { DrawnOf, FigureFinding, FigureName } from "../../../../shared/schemas/figure.ts";
import type { FigureRoom, PlotlyFigure, TokenColour } from "../../../components/plotly-chart.tsx";
import type { Canvas } from "./canvas.ts";
import { drawDemand } from "./demand.ts";
import { drawEigenvalue } from "./eigenvalue.ts";
import { drawElasticities } from "./elasticities.ts";
import { drawEngel } from "./engel.ts";
import { drawFit } from "./fit.ts";
import { drawIncidence } from "./incidence.ts";
import { drawPrice } from "./price.ts";
import { drawShares } from "./shares.ts";

type Drawings = { readonly [S in FigureName]: (drawn: DrawnOf<S>, canvas: Canvas, height: number) => PlotlyFigure };

const DRAWINGS: Drawings = {
  "engel curves": drawEngel,
  "demand curve": drawDemand,
  elasticities: drawElasticities,
  "fit of shares": drawFit,
  "largest eigenvalue": drawEigenvalue,
  incidence: drawIncidence,
  "shares by group": drawShares,
  "price distribution": drawPrice,
};

/** A figure's finding as Plotly takes it, in the colours of the page or of paper. */
export function drawFigure(
  { drawn }: FigureFinding,
  colour: TokenColour,
  { narrow, height }: FigureRoom,
): PlotlyFigure {
  const draw = DRAWINGS[drawn.show] as (one: FigureFinding["drawn"], canvas: Canvas, height: number) => PlotlyFigure;
  return draw(drawn, { colour, narrow }, height);
}
