// Package quantity holds exact amounts, volumes, concentrations, doses, rates
// and body sizes, reads them as people write them, and writes them as ISO and
// safety lists ask for.
//
// Every value is a fraction of whole numbers (rule R1); no binary floating
// point takes part. Roles are types: an [Amount] cannot be used as a
// [BodyWeight], so a dose per kilogram never cancels against the drug's mass
// (rule R3). How a drug is counted, by mass, by biological activity or by
// amount of substance, is its [Kind]; kinds never convert into each other
// (rule R4).
//
// The zero value of every type means "not given". A sum that needs a value
// which is not given is an error, or, where it returns none, is not given
// either; it prints as "".
//
// The Parse functions read plain digits with at most one point between digits,
// at most 15 characters, and a unit. Everything else is a [SyntaxError], which
// says what is wrong and, where that is not open, what was probably meant: a
// text that the same function would read. Nothing is ever read by that guess.
//
// A [Style] prints, and rounds where it must. Exact gives the full value, Written
// the words that a value was read from.
//
// Two values are compared with Cmp or Equal; == does not compile.
package quantity
