/** Published works that a method, a rule or a constant rests on: one entry each, named by key in docstrings and results. */
export const sources = {
  'friedman-1964': 'H. L. Friedman, J. Polym. Sci. C 6 (1964) 183',
  'ozawa-1965': 'T. Ozawa, Bull. Chem. Soc. Jpn. 38 (1965) 1881',
  'flynn-wall-1966': 'J. H. Flynn, L. A. Wall, J. Polym. Sci. B 4 (1966) 323',
  'doyle-1962': 'C. D. Doyle, J. Appl. Polym. Sci. 6 (1962) 639',
  'akahira-sunose-1971': 'T. Akahira, T. Sunose, Res. Rep. Chiba Inst. Technol. 16 (1971) 22',
  'kissinger-1957': 'H. E. Kissinger, Anal. Chem. 29 (1957) 1702',
  'starink-2003': 'M. J. Starink, Thermochim. Acta 404 (2003) 163',
  'vyazovkin-dollimore-1996': 'S. Vyazovkin, D. Dollimore, J. Chem. Inf. Comput. Sci. 36 (1996) 42',
  'vyazovkin-1997': 'S. Vyazovkin, J. Comput. Chem. 18 (1997) 393',
  'ictac-2011': 'S. Vyazovkin et al., Thermochim. Acta 520 (2011) 1 (recommendations on computations)',
  'ictac-2014': 'S. Vyazovkin et al., Thermochim. Acta 590 (2014) 1 (recommendations on collecting data)',
  'abramowitz-stegun-1964': 'M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions (1964), ch. 5 and 26',
  'brent-1973': 'R. P. Brent, Algorithms for Minimization without Derivatives (1973), ch. 4',
  'nist-strd': 'NIST Statistical Reference Datasets (certified values for regression)',
  'savitzky-golay-1964': 'A. Savitzky, M. J. E. Golay, Anal. Chem. 36 (1964) 1627',
  'cleveland-1979': 'W. S. Cleveland, J. Am. Stat. Assoc. 74 (1979) 829 (local regression)',
  'fritsch-carlson-1980': 'F. N. Fritsch, R. E. Carlson, SIAM J. Numer. Anal. 17 (1980) 238',
  'barlow-1972': 'R. E. Barlow et al., Statistical Inference under Order Restrictions (1972), ch. 1 (isotonic regression)',
  'gasser-1986': 'T. Gasser, L. Sroka, C. Jennen-Steinmetz, Biometrika 73 (1986) 625 (noise from differences between neighbours)',
  'hemminger-sarge-1991': 'W. F. Hemminger, S. M. Sarge, J. Therm. Anal. 37 (1991) 1455 (baselines under a peak)',
  'vyazovkin-2001': 'S. Vyazovkin, J. Comput. Chem. 22 (2001) 178 (integrals over small steps of conversion)',
  // Cited from memory, not re-read.
  'cook-weisberg-1982':
    'R. D. Cook, S. Weisberg, Residuals and Influence in Regression (1982), ch. 2 (externally studentised residuals, Bonferroni bound)',
} as const

export type SourceKey = keyof typeof sources
