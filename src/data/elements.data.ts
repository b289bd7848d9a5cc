/**
 * Standard atomic weights, IUPAC 2021: the abridged values of Prohaska et al., Pure Appl. Chem. 94, 573 (2022), and the
 * mass number of the longest-lived isotope (in the table's last column `~`) for elements without one. Values from
 * memory, compared by machine with an independent table. D and T: atomic masses of ²H and ³H (AME 2020, from memory).
 *
 * One element a line: symbol, name, atomic number, atomic weight in u, period, group (0 for the f block).
 */
export const elementTable = `
H hydrogen 1 1.0080 1 1
D deuterium 1 2.01410177784 1 1
T tritium 1 3.01604928132 1 1
He helium 2 4.0026 1 18
Li lithium 3 6.94 2 1
Be beryllium 4 9.0122 2 2
B boron 5 10.81 2 13
C carbon 6 12.011 2 14
N nitrogen 7 14.007 2 15
O oxygen 8 15.999 2 16
F fluorine 9 18.998 2 17
Ne neon 10 20.180 2 18
Na sodium 11 22.990 3 1
Mg magnesium 12 24.305 3 2
Al aluminium 13 26.982 3 13
Si silicon 14 28.085 3 14
P phosphorus 15 30.974 3 15
S sulfur 16 32.06 3 16
Cl chlorine 17 35.45 3 17
Ar argon 18 39.95 3 18
K potassium 19 39.098 4 1
Ca calcium 20 40.078 4 2
Sc scandium 21 44.956 4 3
Ti titanium 22 47.867 4 4
V vanadium 23 50.942 4 5
Cr chromium 24 51.996 4 6
Mn manganese 25 54.938 4 7
Fe iron 26 55.845 4 8
Co cobalt 27 58.933 4 9
Ni nickel 28 58.693 4 10
Cu copper 29 63.546 4 11
Zn zinc 30 65.38 4 12
Ga gallium 31 69.723 4 13
Ge germanium 32 72.630 4 14
As arsenic 33 74.922 4 15
Se selenium 34 78.971 4 16
Br bromine 35 79.904 4 17
Kr krypton 36 83.798 4 18
Rb rubidium 37 85.468 5 1
Sr strontium 38 87.62 5 2
Y yttrium 39 88.906 5 3
Zr zirconium 40 91.224 5 4
Nb niobium 41 92.906 5 5
Mo molybdenum 42 95.95 5 6
Tc technetium 43 97 5 7 ~
Ru ruthenium 44 101.07 5 8
Rh rhodium 45 102.91 5 9
Pd palladium 46 106.42 5 10
Ag silver 47 107.87 5 11
Cd cadmium 48 112.41 5 12
In indium 49 114.82 5 13
Sn tin 50 118.71 5 14
Sb antimony 51 121.76 5 15
Te tellurium 52 127.60 5 16
I iodine 53 126.90 5 17
Xe xenon 54 131.29 5 18
Cs caesium 55 132.91 6 1
Ba barium 56 137.33 6 2
La lanthanum 57 138.91 6 3
Ce cerium 58 140.12 6 0
Pr praseodymium 59 140.91 6 0
Nd neodymium 60 144.24 6 0
Pm promethium 61 145 6 0 ~
Sm samarium 62 150.36 6 0
Eu europium 63 151.96 6 0
Gd gadolinium 64 157.25 6 0
Tb terbium 65 158.93 6 0
Dy dysprosium 66 162.50 6 0
Ho holmium 67 164.93 6 0
Er erbium 68 167.26 6 0
Tm thulium 69 168.93 6 0
Yb ytterbium 70 173.05 6 0
Lu lutetium 71 174.97 6 0
Hf hafnium 72 178.49 6 4
Ta tantalum 73 180.95 6 5
W tungsten 74 183.84 6 6
Re rhenium 75 186.21 6 7
Os osmium 76 190.23 6 8
Ir iridium 77 192.22 6 9
Pt platinum 78 195.08 6 10
Au gold 79 196.97 6 11
Hg mercury 80 200.59 6 12
Tl thallium 81 204.38 6 13
Pb lead 82 207.2 6 14
Bi bismuth 83 208.98 6 15
Po polonium 84 209 6 16 ~
At astatine 85 210 6 17 ~
Rn radon 86 222 6 18 ~
Fr francium 87 223 7 1 ~
Ra radium 88 226 7 2 ~
Ac actinium 89 227 7 3 ~
Th thorium 90 232.04 7 0
Pa protactinium 91 231.04 7 0
U uranium 92 238.03 7 0
Np neptunium 93 237 7 0 ~
Pu plutonium 94 244 7 0 ~
Am americium 95 243 7 0 ~
Cm curium 96 247 7 0 ~
Bk berkelium 97 247 7 0 ~
Cf californium 98 251 7 0 ~
Es einsteinium 99 252 7 0 ~
Fm fermium 100 257 7 0 ~
Md mendelevium 101 258 7 0 ~
No nobelium 102 259 7 0 ~
Lr lawrencium 103 262 7 0 ~
Rf rutherfordium 104 267 7 4 ~
Db dubnium 105 268 7 5 ~
Sg seaborgium 106 269 7 6 ~
Bh bohrium 107 270 7 7 ~
Hs hassium 108 269 7 8 ~
Mt meitnerium 109 277 7 9 ~
Ds darmstadtium 110 281 7 10 ~
Rg roentgenium 111 282 7 11 ~
Cn copernicium 112 285 7 12 ~
Nh nihonium 113 286 7 13 ~
Fl flerovium 114 290 7 14 ~
Mc moscovium 115 290 7 15 ~
Lv livermorium 116 293 7 16 ~
Ts tennessine 117 294 7 17 ~
Og oganesson 118 294 7 18 ~
`;
