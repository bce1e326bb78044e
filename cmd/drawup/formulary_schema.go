package main

import (
	"fmt"
	"io"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// A schemaDocument is the answer of formulary schema.
type schemaDocument struct {
	Tables []schemaTable `json:"tables"`
	findings
}

type schemaTable struct {
	Name string      `json:"name"`
	Says string      `json:"says"`
	Keys []schemaKey `json:"keys"`
}

type schemaKey struct {
	Key     string `json:"key"`
	Kind    string `json:"kind"`
	Says    string `json:"says"`
	Example string `json:"example"`
	Table   string `json:"table,omitempty"`
}

// runFormularySchema describes the formulary file, key by key, from the
// declarations that the reader itself uses.
func runFormularySchema(e env, r *formularyRequest) int {
	doc := &schemaDocument{}
	tables, err := formulary.Schema()
	if err != nil {
		return finish(e, r.json, doc, nil, refusal.List{ourFault(0, err)})
	}
	for _, t := range tables {
		x := schemaTable{Name: t.Name, Says: t.Says}
		for _, f := range t.Fields {
			x.Keys = append(x.Keys, schemaKey(f))
		}
		doc.Tables = append(doc.Tables, x)
	}
	return finish(e, r.json, doc, func(w io.Writer) { tellSchema(w, tables) }, nil)
}

// exampleOf is a line of a file. Tables are opened by their own head.
func exampleOf(f formulary.Field) string {
	switch {
	case strings.HasPrefix(f.Example, "[["):
		return f.Example
	case strings.HasSuffix(f.Kind, "by name") && f.Table != "":
		return "[" + f.Key + "]  " + f.Example
	}
	return f.Key + " = " + f.Example
}

func tellSchema(w io.Writer, tables []formulary.Table) {
	fmt.Fprintln(w, "A formulary file is TOML. Every key it may have; what is not listed is refused, what is left out is blank.")
	for _, t := range tables {
		name := t.Name
		if name == "" {
			name = "the file"
		}
		fmt.Fprintf(w, "\n%s: %s\n", name, t.Says)
		for _, f := range t.Fields {
			kind := f.Kind
			if f.Table != "" {
				kind += " (" + f.Table + ")"
			}
			fmt.Fprintf(w, "\n  %s%s\n", pad(f.Key, 18), kind)
			for _, l := range wrap(f.Says, widest-6) {
				fmt.Fprintln(w, "      "+l)
			}
			fmt.Fprintln(w, "      "+exampleOf(f))
		}
	}
}
