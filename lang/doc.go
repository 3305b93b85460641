// Package lang stands at the foot of the house. It holds nothing itself; the
// folders below it read the language, lowest first: source, quantity,
// diagnostic, syntax, catalogue, model, resolve. Its test keeps all packages of
// the module on their floors.
package lang
