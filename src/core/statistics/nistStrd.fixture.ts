/**
 * NIST Statistical Reference Datasets, linear least squares (www.itl.nist.gov/div898/strd): data and certified values
 * as several public test suites reproduce them.
 */
export interface CertifiedRegression {
  readonly response: readonly number[];
  readonly columns: readonly (readonly number[])[];
  readonly certified: {
    readonly coefficients: readonly number[];
    readonly standardErrors: readonly number[];
    readonly residualStandardDeviation: number;
    readonly rSquared: number;
  };
}

export const NORRIS: CertifiedRegression = {
  response: [
    0.1, 338.8, 118.1, 888, 9.2, 228.1, 668.5, 998.5, 449.1, 778.9, 559.2, 0.3, 0.1, 778.1, 668.8, 339.3,
    448.9, 10.8, 557.7, 228.3, 998, 888.8, 119.6, 0.3, 0.6, 557.6, 339.3, 888, 998.5, 778.9, 10.2, 117.6,
    228.9, 668.4, 449.2, 0.2,
  ],
  columns: [
    [
      0.2, 337.4, 118.2, 884.6, 10.1, 226.5, 666.3, 996.3, 448.6, 777, 558.2, 0.4, 0.6, 775.5, 666.9, 338,
      447.5, 11.6, 556, 228.1, 995.8, 887.6, 120.2, 0.3, 0.3, 556.8, 339.1, 887.2, 999, 779, 11.1, 118.3,
      229.2, 669.1, 448.9, 0.5,
    ],
  ],
  certified: {
    coefficients: [-0.262323073774029, 1.00211681802045],
    standardErrors: [0.232818234301152, 0.000429796848199937],
    residualStandardDeviation: 0.884796396144373,
    rSquared: 0.999993745883712,
  },
};

export const LONGLEY: CertifiedRegression = {
  response: [
    60323, 61122, 60171, 61187, 63221, 63639, 64989, 63761, 66019, 67857, 68169, 66513, 68655, 69564, 69331,
    70551,
  ],
  columns: [
    [83, 88.5, 88.2, 89.5, 96.2, 98.1, 99, 100, 101.2, 104.6, 108.4, 110.8, 112.6, 114.2, 115.7, 116.9],
    [
      234289, 259426, 258054, 284599, 328975, 346999, 365385, 363112, 397469, 419180, 442769, 444546, 482704,
      502601, 518173, 554894,
    ],
    [2356, 2325, 3682, 3351, 2099, 1932, 1870, 3578, 2904, 2822, 2936, 4681, 3813, 3931, 4806, 4007],
    [1590, 1456, 1616, 1650, 3099, 3594, 3547, 3350, 3048, 2857, 2798, 2637, 2552, 2514, 2572, 2827],
    [
      107608, 108632, 109773, 110929, 112075, 113270, 115094, 116219, 117388, 118734, 120445, 121950, 123366,
      125368, 127852, 130081,
    ],
    [1947, 1948, 1949, 1950, 1951, 1952, 1953, 1954, 1955, 1956, 1957, 1958, 1959, 1960, 1961, 1962],
  ],
  certified: {
    coefficients: [
      -3482258.63459582, 15.0618722713733, -0.035819179292591, -2.02022980381683, -1.03322686717359,
      -0.0511041056535807, 1829.15146461355,
    ],
    standardErrors: [
      890420.383607373, 84.9149257747669, 0.0334910077722432, 0.488399681651699, 0.214274163161675,
      0.22607320006937, 455.478499142212,
    ],
    residualStandardDeviation: 304.854073561965,
    rSquared: 0.995479004577296,
  },
};

const STEPS = Array.from({ length: 21 }, (_, x) => x);
const POWERS = [1, 2, 3, 4, 5].map((power) => STEPS.map((x) => x ** power));

/** Wampler 1 and 2: y is the sum of (base x)^k for k = 0 to 5, x = 0 to 20, which leaves nothing unexplained. */
const exactPolynomial = (base: number): CertifiedRegression => ({
  response: STEPS.map((x) => [0, 1, 2, 3, 4, 5].reduce((sum, power) => sum + base ** power * x ** power, 0)),
  columns: POWERS,
  certified: {
    coefficients: [0, 1, 2, 3, 4, 5].map((power) => base ** power),
    standardErrors: [0, 0, 0, 0, 0, 0],
    residualStandardDeviation: 0,
    rSquared: 1,
  },
});

/** Wampler 3 to 5: the same polynomial of base 1 under noise that is a hundred times larger each time. */
const noisyPolynomial = (
  response: readonly number[],
  standardErrors: readonly number[],
  residualStandardDeviation: number,
  rSquared: number,
): CertifiedRegression => ({
  response,
  columns: POWERS,
  certified: { coefficients: [1, 1, 1, 1, 1, 1], standardErrors, residualStandardDeviation, rSquared },
});

export const WAMPLER: Readonly<Record<1 | 2 | 3 | 4 | 5, CertifiedRegression>> = {
  1: exactPolynomial(1),
  2: exactPolynomial(0.1),
  3: noisyPolynomial(
    [
      760, -2042, 2111, -1684, 3888, 1858, 11379, 17560, 39287, 64382, 113159, 175108, 273291, 400186, 581243,
      811568, 1121004, 1506550, 2002767, 2611612, 3369180,
    ],
    [
      2152.3262467817, 2363.55173469681, 779.343524331583, 101.47550755035, 5.64566512170752,
      0.112324854679312,
    ],
    2360.14502379268,
    0.99999555902582,
  ),
  4: noisyPolynomial(
    [
      75901, -204794, 204863, -204436, 253665, -200894, 214131, -185192, 221249, -138370, 315911, -27644,
      455253, 197434, 783995, 608816, 1370781, 1303798, 2205519, 2408860, 3444321,
    ],
    [
      215232.62467817, 236355.173469681, 77934.3524331583, 10147.550755035, 564.566512170752,
      11.2324854679312,
    ],
    236014.502379268,
    0.957478440825662,
  ),
  5: noisyPolynomial(
    [
      7590001, -20479994, 20480063, -20479636, 25231365, -20476094, 20489331, -20460392, 18417449, -20413570,
      20591111, -20302844, 18651453, -20077766, 21059195, -19666384, 26348481, -18971402, 22480719, -17866340,
      10958421,
    ],
    [
      21523262.467817, 23635517.3469681, 7793435.24331583, 1014755.0755035, 56456.6512170752,
      1123.24854679312,
    ],
    23601450.2379268,
    0.0022466892157494,
  ),
};
