/**
 * Exact numbers and their text. What decides anything is an integer, a fraction `[numerator, denominator]`, a
 * cyclotomic number or a phase that is an exact linear form in turns; floats are derived from them and never decide.
 * Source of the arithmetic: H. Cohen, A Course in Computational Algebraic Number Theory (1993); L. C. Washington,
 * Introduction to Cyclotomic Fields (1997).
 */
export * from "./cyclotomic-matrices.js";
export * from "./cyclotomic-text.js";
export * from "./cyclotomics.js";
export * from "./echelon.js";
export * from "./format-number.js";
export * from "./hermite.js";
export * from "./integers.js";
export * from "./linear-form-text.js";
export * from "./linear-forms.js";
export * from "./matrices.js";
export * from "./phased-numbers.js";
export * from "./rationals.js";
export * from "./tolerances.js";
