// Package tree works over trees of files: it finds the documents that operands
// name, by the ignore rules of git, and tells which places of them changed since a
// revision and which marks are known already.
//
// Paths are the system's own and are returned as the user spelled their beginning.
// Nothing is written but by WriteKnown, and nothing is run but git, by Changed.
package tree
