// Package quantity knows physical dimensions, units and the numbers that carry
// them: what may be added to what, how a value is written for people, and what
// a dimension is called in words.
//
// Values are SI inside: metre, kilogram, second, kelvin, and what is made of
// them (newton, pascal …). Units are data in one table, not a type each.
//
// What does not live here: reading expressions (lang/syntax, lang/resolve),
// section and material properties (lang/catalogue).
package quantity
