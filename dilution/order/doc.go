// Package order reads what is wanted and what there is to make it from: the order
// file with its session, the site's settings, the patients and their syringes;
// and the shelf file with the containers, syringes, fluids and pumps of a place.
// Each value keeps the text it was read from and its place in the file.
//
// The package checks form: that keys are there, fit each other and read as
// quantities, and that a body's figures are those of a body. It knows no
// drug; what is allowed is the formulary's and the plan's question.
package order
