// Package hardware is the catalogue of what is bought: bolts, nuts, washers, bearings, collars, the
// holes that they need and the rules by which they are chosen.
//
// The tables are CSV files in catalogue, embedded in the program, with a source on every row and a
// word on how far it was confirmed: "2+ places", "1 place", "from memory" or "common practice, no
// source". No standard itself was read; what was compared are public tables of its figures. Every
// value given out carries that wording in its Source.
//
// Lengths are millimetres, masses grams. Sizes are written as the trade writes them: "M4" for metric
// bolts, "#8" and "1/4" for inch bolts, "624" and "MR105ZZ" for bearings. Inch bolts have clearance
// holes only: there are no inch lengths, heads or nuts in the catalogue, and asking for them is an
// error that wraps ErrInch.
package hardware
