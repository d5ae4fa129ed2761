/** The literature of the methods, once. Entries are written from memory of the printed works. */

export interface Reference {
  /** Family name, then initials, in the order of the title page. */
  readonly authors: readonly (readonly [family: string, initials: string])[];
  readonly year: number;
  readonly title: string;
  /** Absent of a thesis. */
  readonly journal?: string;
  readonly volume?: number;
  readonly issue?: number;
  readonly pages?: readonly [first: number, last: number];
  /** Of a thesis: where it was submitted. */
  readonly school?: string;
}

const AJAE = "American Journal of Agricultural Economics";
const AER = "American Economic Review";
const JBES = "Journal of Business & Economic Statistics";

export const REFERENCES = {
  banksBlundellLewbel1997: {
    authors: [
      ["Banks", "J."],
      ["Blundell", "R."],
      ["Lewbel", "A."],
    ],
    year: 1997,
    title: "Quadratic Engel curves and consumer demand",
    journal: "Review of Economics and Statistics",
    volume: 79,
    issue: 4,
    pages: [527, 539],
  },
  barten1966: {
    authors: [["Barten", "A. P."]],
    year: 1966,
    title: "Theorie en empirie van een volledig stelsel van vraagvergelijkingen",
    school: "Netherlands School of Economics, Rotterdam",
  },
  blundellRobin1999: {
    authors: [
      ["Blundell", "R."],
      ["Robin", "J.-M."],
    ],
    year: 1999,
    title: "Estimation in large and disaggregated demand systems: an estimator for conditionally linear systems",
    journal: "Journal of Applied Econometrics",
    volume: 14,
    issue: 3,
    pages: [209, 232],
  },
  carpentierGuyomard2001: {
    authors: [
      ["Carpentier", "A."],
      ["Guyomard", "H."],
    ],
    year: 2001,
    title: "Unconditional elasticities in two-stage demand systems: an approximate solution",
    journal: AJAE,
    volume: 83,
    issue: 1,
    pages: [222, 229],
  },
  deatonMuellbauer1980: {
    authors: [
      ["Deaton", "A."],
      ["Muellbauer", "J."],
    ],
    year: 1980,
    title: "An almost ideal demand system",
    journal: AER,
    volume: 70,
    issue: 3,
    pages: [312, 326],
  },
  diewertWales1987: {
    authors: [
      ["Diewert", "W. E."],
      ["Wales", "T. J."],
    ],
    year: 1987,
    title: "Flexible functional forms and global curvature conditions",
    journal: "Econometrica",
    volume: 55,
    issue: 1,
    pages: [43, 68],
  },
  ealesUnnevehr1988: {
    authors: [
      ["Eales", "J. S."],
      ["Unnevehr", "L. J."],
    ],
    year: 1988,
    title: "Demand for beef and chicken products: separability and structural change",
    journal: AJAE,
    volume: 70,
    issue: 3,
    pages: [521, 532],
  },
  edgerton1997: {
    authors: [["Edgerton", "D. L."]],
    year: 1997,
    title: "Weak separability and the estimation of elasticities in multistage demand systems",
    journal: AJAE,
    volume: 79,
    issue: 1,
    pages: [62, 79],
  },
  efron1979: {
    authors: [["Efron", "B."]],
    year: 1979,
    title: "Bootstrap methods: another look at the jackknife",
    journal: "Annals of Statistics",
    volume: 7,
    issue: 1,
    pages: [1, 26],
  },
  italianer1985: {
    authors: [["Italianer", "A."]],
    year: 1985,
    title: "A small-sample correction for the likelihood ratio test",
    journal: "Economics Letters",
    volume: 19,
    issue: 4,
    pages: [315, 317],
  },
  kunsch1989: {
    authors: [["Künsch", "H. R."]],
    year: 1989,
    title: "The jackknife and the bootstrap for general stationary observations",
    journal: "Annals of Statistics",
    volume: 17,
    issue: 3,
    pages: [1217, 1241],
  },
  laitinen1978: {
    authors: [["Laitinen", "K."]],
    year: 1978,
    title: "Why is demand homogeneity so often rejected?",
    journal: "Economics Letters",
    volume: 1,
    issue: 3,
    pages: [187, 191],
  },
  lewbelPendakur2009: {
    authors: [
      ["Lewbel", "A."],
      ["Pendakur", "K."],
    ],
    year: 2009,
    title: "Tricks with Hicks: the EASI demand system",
    journal: AER,
    volume: 99,
    issue: 3,
    pages: [827, 863],
  },
  liangZeger1986: {
    authors: [
      ["Liang", "K.-Y."],
      ["Zeger", "S. L."],
    ],
    year: 1986,
    title: "Longitudinal data analysis using generalized linear models",
    journal: "Biometrika",
    volume: 73,
    issue: 1,
    pages: [13, 22],
  },
  moschini1995: {
    authors: [["Moschini", "G."]],
    year: 1995,
    title: "Units of measurement and the Stone index in demand system estimation",
    journal: AJAE,
    volume: 77,
    issue: 1,
    pages: [63, 68],
  },
  moschini1998: {
    authors: [["Moschini", "G."]],
    year: 1998,
    title: "The semiflexible almost ideal demand system",
    journal: "European Economic Review",
    volume: 42,
    issue: 2,
    pages: [349, 364],
  },
  pollakWales1981: {
    authors: [
      ["Pollak", "R. A."],
      ["Wales", "T. J."],
    ],
    year: 1981,
    title: "Demographic variables in demand analysis",
    journal: "Econometrica",
    volume: 49,
    issue: 6,
    pages: [1533, 1551],
  },
  ryanWales1998: {
    authors: [
      ["Ryan", "D. L."],
      ["Wales", "T. J."],
    ],
    year: 1998,
    title: "A simple method for imposing local curvature in some flexible consumer-demand systems",
    journal: JBES,
    volume: 16,
    issue: 3,
    pages: [331, 338],
  },
  shonkwilerYen1999: {
    authors: [
      ["Shonkwiler", "J. S."],
      ["Yen", "S. T."],
    ],
    year: 1999,
    title: "Two-step estimation of a censored system of equations",
    journal: AJAE,
    volume: 81,
    issue: 4,
    pages: [972, 982],
  },
  stone1954: {
    authors: [["Stone", "R."]],
    year: 1954,
    title: "Linear expenditure systems and demand analysis: an application to the pattern of British demand",
    journal: "Economic Journal",
    volume: 64,
    issue: 255,
    pages: [511, 527],
  },
  theil1965: {
    authors: [["Theil", "H."]],
    year: 1965,
    title: "The information approach to demand analysis",
    journal: "Econometrica",
    volume: 33,
    issue: 1,
    pages: [67, 87],
  },
  white1980: {
    authors: [["White", "H."]],
    year: 1980,
    title: "A heteroskedasticity-consistent covariance matrix estimator and a direct test for heteroskedasticity",
    journal: "Econometrica",
    volume: 48,
    issue: 4,
    pages: [817, 838],
  },
  zellner1962: {
    authors: [["Zellner", "A."]],
    year: 1962,
    title: "An efficient method of estimating seemingly unrelated regressions and tests for aggregation bias",
    journal: "Journal of the American Statistical Association",
    volume: 57,
    issue: 298,
    pages: [348, 368],
  },
  zellnerTheil1962: {
    authors: [
      ["Zellner", "A."],
      ["Theil", "H."],
    ],
    year: 1962,
    title: "Three-stage least squares: simultaneous estimation of simultaneous equations",
    journal: "Econometrica",
    volume: 30,
    issue: 1,
    pages: [54, 78],
  },
} as const satisfies Readonly<Record<string, Reference>>;

export type ReferenceKey = keyof typeof REFERENCES;
