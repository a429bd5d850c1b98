import type { Citation } from '@stillroom/shared/cells';

/**
 * The publications that theorems cite, once each. A doi stands where it was looked up; the others have journal, volume
 * and pages.
 */
export const sources = {
  sturm1835: {
    authors: 'C. Sturm',
    year: 1835,
    title: 'Mémoire sur la résolution des équations numériques',
    where:
      'Mémoires présentés par divers savants à l’Académie royale des sciences de l’Institut de France 6, 271–318',
  },
  wegscheider1901: {
    authors: 'R. Wegscheider',
    year: 1901,
    title:
      'Über simultane Gleichgewichte und die Beziehungen zwischen Thermodynamik und Reactionskinetik homogener Systeme',
    doi: '10.1007/BF01517498',
  },
  krawczyk1969: {
    authors: 'R. Krawczyk',
    year: 1969,
    title: 'Newton-Algorithmen zur Bestimmung von Nullstellen mit Fehlerschranken',
    doi: '10.1007/BF02234767',
  },
  spitzer1970: {
    authors: 'F. Spitzer',
    year: 1970,
    title: 'Interaction of Markov processes',
    doi: '10.1016/0001-8708(70)90034-4',
  },
  horn1972: {
    authors: 'F. Horn',
    year: 1972,
    title: 'Necessary and sufficient conditions for complex balancing in chemical kinetics',
    doi: '10.1007/BF00255664',
  },
  hornJackson1972: {
    authors: 'F. Horn, R. Jackson',
    year: 1972,
    title: 'General mass action kinetics',
    doi: '10.1007/BF00251225',
  },
  feinberg1972: {
    authors: 'M. Feinberg',
    year: 1972,
    title: 'Complex balancing in general kinetic systems',
    doi: '10.1007/BF00255665',
  },
  feinberg1987: {
    authors: 'M. Feinberg',
    year: 1987,
    title:
      'Chemical reaction network structure and the stability of complex isothermal reactors I. The deficiency zero and deficiency one theorems',
    doi: '10.1016/0009-2509(87)80099-4',
  },
  feinberg1988: {
    authors: 'M. Feinberg',
    year: 1988,
    title:
      'Chemical reaction network structure and the stability of complex isothermal reactors II. Multiple steady states for networks of deficiency one',
    doi: '10.1016/0009-2509(88)87122-7',
  },
  feinberg1989: {
    authors: 'M. Feinberg',
    year: 1989,
    title:
      'Necessary and sufficient conditions for detailed balancing in mass action systems of arbitrary complexity',
    where: 'Chemical Engineering Science 44, 1819–1827',
  },
  schuster1989: {
    authors: 'S. Schuster, R. Schuster',
    year: 1989,
    title:
      'A generalization of Wegscheider’s condition. Implications for properties of steady states and for quasi-steady-state approximation',
    doi: '10.1007/BF01171883',
  },
  meynTweedie1993: {
    authors: 'S. P. Meyn, R. L. Tweedie',
    year: 1993,
    title: 'Stability of Markovian processes III: Foster–Lyapunov criteria for continuous-time processes',
    doi: '10.2307/1427522',
  },
  hofbauer1990: {
    authors: 'J. Hofbauer',
    year: 1990,
    title: 'An index theorem for dissipative semiflows',
    where: 'Rocky Mountain Journal of Mathematics 20, 1017–1031',
  },
  feinberg1995existence: {
    authors: 'M. Feinberg',
    year: 1995,
    title: 'The existence and uniqueness of steady states for a class of chemical reaction networks',
    doi: '10.1007/BF00375614',
  },
  feinberg1995multiple: {
    authors: 'M. Feinberg',
    year: 1995,
    title: 'Multiple steady states for chemical reaction networks of deficiency one',
    doi: '10.1007/BF00375615',
  },
  evansMajumdarZia2004: {
    authors: 'M. R. Evans, S. N. Majumdar, R. K. P. Zia',
    year: 2004,
    title: 'Factorised steady states in mass transport models',
    where: 'Journal of Physics A 37, L275–L280',
  },
  craciunFeinberg2005: {
    authors: 'G. Craciun, M. Feinberg',
    year: 2005,
    title: 'Multiple equilibria in complex chemical reaction networks: I. The injectivity property',
    doi: '10.1137/S0036139904440278',
  },
  evansHanney2005: {
    authors: 'M. R. Evans, T. Hanney',
    year: 2005,
    title: 'Nonequilibrium statistical mechanics of the zero-range process and related models',
    doi: '10.1088/0305-4470/38/19/R01',
  },
  evansMajumdarZia2006: {
    authors: 'M. R. Evans, S. N. Majumdar, R. K. P. Zia',
    year: 2006,
    title: 'Factorised steady states in mass transport models on an arbitrary graph',
    doi: '10.1088/0305-4470/39/18/006',
  },
  greenblattLebowitz2006: {
    authors: 'R. L. Greenblatt, J. L. Lebowitz',
    year: 2006,
    title: 'Product measure steady states of generalized zero range processes',
    doi: '10.1088/0305-4470/39/7/003',
  },
  angeliDeLeenheerSontag2007: {
    authors: 'D. Angeli, P. De Leenheer, E. D. Sontag',
    year: 2007,
    title: 'A Petri net approach to the study of persistence in chemical reaction networks',
    doi: '10.1016/j.mbs.2007.07.003',
  },
  jahnkeHuisinga2007: {
    authors: 'T. Jahnke, W. Huisinga',
    year: 2007,
    title: 'Solving the chemical master equation for monomolecular reaction systems analytically',
    doi: '10.1007/s00285-006-0034-x',
  },
  anderson2008: {
    authors: 'D. F. Anderson',
    year: 2008,
    title: 'Global asymptotic stability for a class of nonlinear chemical equations',
    where: 'SIAM Journal on Applied Mathematics 68, 1464–1476',
  },
  craciunDickensteinShiuSturmfels2009: {
    authors: 'G. Craciun, A. Dickenstein, A. Shiu, B. Sturmfels',
    year: 2009,
    title: 'Toric dynamical systems',
    doi: '10.1016/j.jsc.2008.08.006',
  },
  andersonCraciunKurtz2010: {
    authors: 'D. F. Anderson, G. Craciun, T. G. Kurtz',
    year: 2010,
    title: 'Product-form stationary distributions for deficiency zero chemical reaction networks',
    doi: '10.1007/s11538-010-9517-4',
  },
  shinarFeinberg2010: {
    authors: 'G. Shinar, M. Feinberg',
    year: 2010,
    title: 'Structural sources of robustness in biochemical reaction networks',
    doi: '10.1126/science.1183372',
  },
  anderson2011: {
    authors: 'D. F. Anderson',
    year: 2011,
    title: 'A proof of the global attractor conjecture in the single linkage class case',
    doi: '10.1137/11082631X',
  },
  boros2012: {
    authors: 'B. Boros',
    year: 2012,
    title: 'Notes on the deficiency-one theorem: multiple linkage classes',
    where: 'Mathematical Biosciences 235, 110–122',
  },
  pantea2012: {
    authors: 'C. Pantea',
    year: 2012,
    title: 'On the persistence and global stability of mass-action systems',
    where: 'SIAM Journal on Mathematical Analysis 44, 1636–1673',
  },
  shinarFeinberg2012: {
    authors: 'G. Shinar, M. Feinberg',
    year: 2012,
    title: 'Concordant chemical reaction networks',
    doi: '10.1016/j.mbs.2012.05.004',
  },
  boros2013: {
    authors: 'B. Boros',
    year: 2013,
    title:
      'On the dependence of the existence of the positive steady states on the rate coefficients for deficiency-one mass action systems: single linkage class',
    doi: '10.1007/s10910-013-0222-z',
  },
  craciunNazarovPantea2013: {
    authors: 'G. Craciun, F. Nazarov, C. Pantea',
    year: 2013,
    title: 'Persistence and permanence of mass-action and power-law dynamical systems',
    doi: '10.1137/100812355',
  },
  wiufFeliu2013: {
    authors: 'C. Wiuf, E. Feliu',
    year: 2013,
    title:
      'Power-law kinetics and determinant criteria for the preclusion of multistationarity in networks of interacting species',
    where: 'SIAM Journal on Applied Dynamical Systems 12, 1685–1721',
  },
  andersonEncisoJohnston2014: {
    authors: 'D. F. Anderson, G. A. Enciso, M. D. Johnston',
    year: 2014,
    title: 'Stochastic analysis of biochemical reaction networks with absolute concentration robustness',
    doi: '10.1098/rsif.2013.0943',
  },
  gopalkrishnanMillerShiu2014: {
    authors: 'M. Gopalkrishnan, E. Miller, A. Shiu',
    year: 2014,
    title: 'A geometric approach to the global attractor conjecture',
    where: 'SIAM Journal on Applied Dynamical Systems 13, 758–797',
  },
  guptaBriatKhammash2014: {
    authors: 'A. Gupta, C. Briat, M. Khammash',
    year: 2014,
    title:
      'A scalable computational framework for establishing long-term behavior of stochastic reaction networks',
    doi: '10.1371/journal.pcbi.1003669',
  },
  cappellettiWiuf2016: {
    authors: 'D. Cappelletti, C. Wiuf',
    year: 2016,
    title: 'Product-form Poisson-like distributions and complex balanced reaction systems',
    doi: '10.1137/15M1029916',
  },
  mueller2016: {
    authors: 'S. Müller, E. Feliu, G. Regensburger, C. Conradi, A. Shiu, A. Dickenstein',
    year: 2016,
    title:
      'Sign conditions for injectivity of generalized polynomial maps with applications to chemical reaction networks and real algebraic geometry',
    doi: '10.1007/s10208-014-9239-3',
  },
  conradiFeliuMinchevaWiuf2017: {
    authors: 'C. Conradi, E. Feliu, M. Mincheva, C. Wiuf',
    year: 2017,
    title: 'Identifying parameter regions for multistationarity',
    doi: '10.1371/journal.pcbi.1005751',
  },
  joshiShiu2017: {
    authors: 'B. Joshi, A. Shiu',
    year: 2017,
    title: 'Which small reaction networks are multistationary?',
    where: 'Mathematical Modelling of Natural Phenomena 12, 153–178',
  },
  andersonCappellettiKoyamaKurtz2018: {
    authors: 'D. F. Anderson, D. Cappelletti, M. Koyama, T. G. Kurtz',
    year: 2018,
    title: 'Non-explosivity of stochastically modeled reaction networks that are complex balanced',
    doi: '10.1007/s11538-018-0473-8',
  },
  boros2019: {
    authors: 'B. Boros',
    year: 2019,
    title: 'Existence of positive steady states for weakly reversible mass-action systems',
    where: 'SIAM Journal on Mathematical Analysis 51, 435–449',
  },
  andersonSchnoerrYuan2020: {
    authors: 'D. F. Anderson, D. Schnoerr, C. Yuan',
    year: 2020,
    title:
      'Time-dependent product-form Poisson distributions for reaction networks with higher order complexes',
    doi: '10.1007/s00285-020-01485-y',
  },
  xuHansenWiuf2022: {
    authors: 'C. Xu, M. C. Hansen, C. Wiuf',
    year: 2022,
    title:
      'Full classification of dynamics for one-dimensional continuous-time Markov chains with polynomial transition rates',
    where: 'Advances in Applied Probability 55, 321–355',
  },
} as const satisfies Record<string, Citation>;
