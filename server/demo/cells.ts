import type { DemoStudy } from "./seed.ts";
import { SURVEY_NAME, simulateSurvey } from "./simulate.ts";

const SURVEY = `# One row is what one household bought in one week.
upload: ${SURVEY_NAME}
goods:
  Grains: {price: p_grains, expenditure: e_grains}
  Dairy: {price: p_dairy, expenditure: e_dairy}
  Produce: {price: p_produce, quantity: q_produce}
  Meat & fish: {price: p_meat, expenditure: e_meat}
  Sweet drinks: {price: p_sweet, quantity: q_sweet_l}   # litres, as p_sweet is a litre's
  Other food: {price: p_other, expenditure: e_other}
total: e_total
weight: survey_weight
cluster: village
time: month             # 1 is January 2029
derive:
  log_size: log(members)
keep: members <= 12     # larger households are boarding houses
normalise: mean
`;

const BASE = `data: survey
form: aids
demographics: [log_size, urban]
impose: [homogeneity, symmetry]
estimator: maximum likelihood

# expenditure taken as exogenous for now;
# test it before the paper goes out
`;

const LAWS = `# what the survey says of the laws imposed on base, and of what shifts its intercepts
system: base
`;

const MATRIX = `system: base
at: base point
form: share
`;

const NINETIETH = `# who would bear the levy: households that spend more than nine in ten
system: base
at: {x: quantile 0.9}
form: share
`;

const FIFTHS = `# do households that spend little answer prices more?
system: base
groups: {of: total expenditure, quantiles: 5}
`;

const LEVY = `# a levy of a quarter on sweet drinks, passed on in full
system: base
at: mean
prices:
  Sweet drinks: {ad valorem: 25}
# fifths of what a household spends for each equivalent adult
groups: {of: expenditure per equivalent adult, quantiles: 5}
equivalence scale: {square root of: members}
`;

const DEMAND = `# how far a levy can move what is bought
system: base
show: demand curve
goods: [Sweet drinks]
`;

const LINEAR = `# how much the exact price index matters
data: survey
form: la-aids
index: tornqvist
demographics: [log_size, urban]
impose: [homogeneity, symmetry]
estimator: iterated seemingly unrelated
`;

const NEEDS = `# committed quantities first, the rest by fixed shares (Stone 1954)
data: survey
form: les
estimator: maximum likelihood
`;

const ARGUMENT = `At the base point meat & fish is a luxury, *η* = {base: eta, meat & fish}, and grains a necessity, *η* = {base: eta, grains}. Negativity holds for {matrix: rows that hold} of households, so that the compensated effects may be used where most of them live.

Sweet drinks take {survey: mean share, sweet drinks} of the average budget, and their compensated own-price elasticity is {matrix: compensated, sweet drinks, sweet drinks}. To second order a levy on them costs a household

$$
\\Delta \\ln c \\approx w_i \\, \\Delta \\ln p_i + \\tfrac{1}{2} \\, k_{ii} \\, (\\Delta \\ln p_i)^2
$$

of its food budget, with $k_{ii}$ = {matrix: entry, sweet drinks, sweet drinks}.[^point]

[^point]: At the base point. Larger budgets are looked at in the cell ninetieth; $w_i$ is the share predicted there.
`;

const DEMO_TITLE = "Food demand in Velmark, 2029–31";

const DEMO_LEDE =
  "How households in the Velmark Household Purchases Survey move a weekly food budget between six groups of goods when prices change, and who would bear a levy on sweet drinks.";

/** The questions of the study, in its order. */
const DEMO_CELLS: DemoStudy["cells"] = [
  { name: "survey", kind: "data", source: SURVEY },
  { name: "base", kind: "system", source: BASE },
  { name: "laws", kind: "tests", source: LAWS },
  { name: "matrix", kind: "slutsky", source: MATRIX },
  { name: "ninetieth", kind: "slutsky", source: NINETIETH },
  { name: "fifths", kind: "elasticities", source: FIFTHS },
  { name: "levy", kind: "price change", source: LEVY },
  { name: "demand", kind: "figure", source: DEMAND },
  { name: "linear", kind: "system", source: LINEAR },
  { name: "needs", kind: "system", source: NEEDS },
  { name: "argument", kind: "text", source: ARGUMENT },
];

/** The study an installation opens with: invented households, and the questions asked of them. */
export function demoStudy(): DemoStudy {
  return {
    title: DEMO_TITLE,
    lede: DEMO_LEDE,
    upload: { name: SURVEY_NAME, csv: simulateSurvey() },
    cells: DEMO_CELLS,
  };
}
