/**
 * Published works that a method, a rule or a constant rests on: one entry each, named by key in docstrings and results. What was remembered and not read again says so
 * in the text itself, since that is what reports print; its numbers are recomputed wherever they can be.
 */
export const sources = {
  'friedman-1964': 'H. L. Friedman, J. Polym. Sci. C 6 (1964) 183',
  'ozawa-1965': 'T. Ozawa, Bull. Chem. Soc. Jpn. 38 (1965) 1881 (cited from memory)',
  'flynn-wall-1966': 'J. H. Flynn, L. A. Wall, J. Polym. Sci. B 4 (1966) 323 (cited from memory)',
  'doyle-1962': 'C. D. Doyle, J. Appl. Polym. Sci. 6 (1962) 639 (cited from memory)',
  'akahira-sunose-1971': 'T. Akahira, T. Sunose, Res. Rep. Chiba Inst. Technol. 16 (1971) 22',
  'kissinger-1957': 'H. E. Kissinger, Anal. Chem. 29 (1957) 1702',
  'starink-2003': 'M. J. Starink, Thermochim. Acta 404 (2003) 163 (cited from memory)',
  'vyazovkin-dollimore-1996': 'S. Vyazovkin, D. Dollimore, J. Chem. Inf. Comput. Sci. 36 (1996) 42 (cited from memory)',
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
  'arrhenius-1889': 'S. Arrhenius, Z. Phys. Chem. 4 (1889) 226 (cited from memory)',
  'iupac-arrhenius': 'IUPAC, Compendium of Chemical Terminology, "activation energy", "modified Arrhenius equation" (cited from memory)',
  'eyring-1935': 'H. Eyring, J. Chem. Phys. 3 (1935) 107 (cited from memory)',
  'levenspiel-1999':
    'O. Levenspiel, Chemical Reaction Engineering, 3rd ed. (1999), ch. 2 (temperature dependence from times; cited from memory)',
  'cook-weisberg-1982':
    'R. D. Cook, S. Weisberg, Residuals and Influence in Regression (1982), ch. 2 (externally studentised residuals, Bonferroni bound; cited from memory)',
  'salmon-2011':
    'J. K. Salmon, M. A. Moraes, R. O. Dror, D. E. Shaw, Proc. SC11 (2011) art. 16 (counter-based random numbers; cited from memory)',
  'marsaglia-bray-1964': 'G. Marsaglia, T. A. Bray, SIAM Rev. 6 (1964) 260 (normal numbers by the polar method; cited from memory)',
  'starink-1996': 'M. J. Starink, Thermochim. Acta 288 (1996) 97 (cited from memory)',
  'murray-white-1955': 'P. Murray, J. White, Trans. Brit. Ceram. Soc. 54 (1955) 204 (cited from memory)',
  'coats-redfern-1964': 'A. W. Coats, J. P. Redfern, Nature 201 (1964) 68 (cited from memory)',
  'gorbachev-1975': 'V. M. Gorbachev, J. Therm. Anal. 8 (1975) 349 (cited from memory)',
  'senum-yang-1977': 'G. I. Senum, R. T. Yang, J. Therm. Anal. 11 (1977) 445 (cited from memory)',
  'flynn-1997': 'J. H. Flynn, Thermochim. Acta 300 (1997) 83 (misprints in closed forms of the temperature integral; cited from memory)',
  'perez-maqueda-criado-2000':
    'L. A. Pérez-Maqueda, J. M. Criado, J. Therm. Anal. Calorim. 60 (2000) 909 (accuracy of the rational forms; cited from memory)',
  'li-1985': 'C.-H. Li, AIChE J. 31 (1985) 1036 (cited from memory)',
  'madhusudanan-1993': 'P. M. Madhusudanan, K. Krishnan, K. N. Ninan, Thermochim. Acta 97 (1986) 189; 221 (1993) 13 (cited from memory)',
  'agrawal-1987': 'R. K. Agrawal, AIChE J. 33 (1987) 1212 (cited from memory)',
  'tang-2003': 'W. Tang, Y. Liu, H. Zhang, Z. Wang, C. Wang, Thermochim. Acta 408 (2003) 39 (cited from memory)',
  'astm-e1641':
    'ASTM E1641, Decomposition kinetics by thermogravimetry using the Ozawa/Flynn/Wall method (scope read; equations and table from memory)',
  'astm-e1877': 'ASTM E1877, Calculating thermal endurance of materials from thermogravimetric decomposition data (equation from memory)',
  'khawam-flanagan-2006': 'A. Khawam, D. R. Flanagan, J. Phys. Chem. B 110 (2006) 17315 (solid-state reaction models; cited from memory)',
  'avrami-1939': 'M. Avrami, J. Chem. Phys. 7 (1939) 1103 (cited from memory)',
  'jander-1927': 'W. Jander, Z. Anorg. Allg. Chem. 163 (1927) 1 (cited from memory)',
  'ginstling-brounshtein-1950': 'A. M. Ginstling, B. I. Brounshtein, J. Appl. Chem. USSR 23 (1950) 1327 (cited from memory)',
  'prout-tompkins-1944': 'E. G. Prout, F. C. Tompkins, Trans. Faraday Soc. 40 (1944) 488 (cited from memory)',
  'sestak-berggren-1971': 'J. Šesták, G. Berggren, Thermochim. Acta 3 (1971) 1 (cited from memory)',
  'burnham-braun-1999': 'A. K. Burnham, R. L. Braun, Energy Fuels 13 (1999) 1 (cited from memory)',
  'sanchez-jimenez-2010': 'P. E. Sánchez-Jiménez et al., Polym. Degrad. Stab. 95 (2010) 733 (random scission; cited from memory)',
  'malek-1992': 'J. Málek, Thermochim. Acta 200 (1992) 257 (shape of the y and z functions; cited from memory)',
  'zhou-grant-2004': 'D. Zhou, D. J. W. Grant, J. Phys. Chem. A 108 (2004) 4239 (a wrong model on one curve)',
  'vyazovkin-wight-1999': 'S. Vyazovkin, C. A. Wight, Thermochim. Acta 340–341 (1999) 53',
  'usp-1160': 'USP general chapter <1160>, Pharmaceutical calculations in prescription compounding (mean kinetic temperature)',
  'haynes-1971': 'J. D. Haynes, J. Pharm. Sci. 60 (1971) 927 (virtual temperature; cited from memory)',
  'vyazovkin-wight-2000':
    'S. Vyazovkin, C. A. Wight, Anal. Chem. 72 (2000) 3171 (confidence intervals of nonlinear isoconversional methods; cited from memory)',
  'tukey-1958': 'J. W. Tukey, Ann. Math. Stat. 29 (1958) 614 (jackknife, abstract; cited from memory)',
  'efron-tibshirani-1993': 'B. Efron, R. J. Tibshirani, An Introduction to the Bootstrap (1993), ch. 6, 11 and 13 (cited from memory)',
  'draper-smith-1998':
    'N. R. Draper, H. Smith, Applied Regression Analysis, 3rd ed. (1998), ch. 1 to 3 (line, bands, extra term; lack of fit, pure error, approximate repeats; cited from memory)',
  'astm-e698':
    'ASTM E698 (kinetic parameters for thermally unstable materials by differential scanning calorimetry; equations from memory)',
  'astm-e2890': 'ASTM E2890 (kinetic parameters and reaction order by differential scanning calorimetry; equations from memory)',
  'astm-e2041': 'ASTM E2041 (kinetic parameters by differential scanning calorimetry, Borchardt and Daniels; equations from memory)',
  'farjas-roura-2014': 'J. Farjas, P. Roura, Thermochim. Acta 598 (2014) 51',
  'borchardt-daniels-1957': 'H. J. Borchardt, F. Daniels, J. Am. Chem. Soc. 79 (1957) 41 (from memory)',
  'augis-bennett-1978': 'J. A. Augis, J. E. Bennett, J. Therm. Anal. 13 (1978) 283 (from memory)',
  'flynn-1983': 'J. H. Flynn, J. Therm. Anal. 27 (1983) 95 (correction of the Ozawa–Flynn–Wall energy; from memory)',
  'iso-11358-2':
    'ISO 11358-2, Plastics, Thermogravimetry (TG) of polymers, Part 2: Determination of activation energy (scope read; equation from memory)',
  'jcgm-100-2008': 'JCGM 100:2008, Evaluation of measurement data: guide to the expression of uncertainty in measurement',
  'abernethy-1985': 'R. B. Abernethy, R. P. Benedict, R. B. Dowdell, J. Fluids Eng. 107 (1985) 161 (cited from memory)',
  'jcgm-101-2008': 'JCGM 101:2008, Supplement 1 to the guide: propagation of distributions using a Monte Carlo method',
  'levenberg-1944': 'K. Levenberg, Q. Appl. Math. 2 (1944) 164 (cited from memory)',
  'marquardt-1963': 'D. W. Marquardt, J. Soc. Ind. Appl. Math. 11 (1963) 431 (cited from memory)',
  'more-1978': 'J. J. Moré, Lect. Notes Math. 630 (1978) 105 (Levenberg–Marquardt in a trust region; cited from memory)',
  'anderson-1965': 'D. G. Anderson, J. Assoc. Comput. Mach. 12 (1965) 547 (mixing of successive iterates; cited from memory)',
  'bates-watts-1981':
    'D. M. Bates, D. G. Watts, Technometrics 23 (1981) 179 (relative offset as a criterion of convergence; cited from memory)',
  'wald-wolfowitz-1940': 'A. Wald, J. Wolfowitz, Ann. Math. Stat. 11 (1940) 147 (runs of signs; cited from memory)',
  'swed-eisenhart-1943': 'F. S. Swed, C. Eisenhart, Ann. Math. Stat. 14 (1943) 66 (runs of signs, exact; cited from memory)',
  'bates-watts-1988':
    'D. M. Bates, D. G. Watts, Nonlinear Regression Analysis and Its Applications (1988), ch. 2 and 3 (covariance by linearisation; errors after a transformation; cited from memory)',
  'golub-van-loan-1996': 'G. H. Golub, C. F. Van Loan, Matrix Computations (3rd ed., 1996), ch. 5 (QR; cited from memory)',
  'dennis-schnabel-1983':
    'J. E. Dennis, R. B. Schnabel, Numerical Methods for Unconstrained Optimization (1983), ch. 5 (derivatives by differences; cited from memory)',
} as const

export type SourceKey = keyof typeof sources
