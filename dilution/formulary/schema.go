package formulary

import (
	_ "embed"
	"fmt"
	"go/ast"
	"go/parser"
	"go/token"
	"strconv"
	"strings"
)

// recordSource is the file that declares the records. The description of the
// format is read from it, so that it cannot say anything else than the reader.
//
//go:embed record.go
var recordSource string

// A Table of the schema is one table of a formulary file.
type Table struct {
	Name   string // "drug.presentation", "" for the file itself
	Says   string
	Fields []Field
}

// A Field is one key of a table.
type Field struct {
	Key     string
	Kind    string // "text", "true or false", "list of texts", "table", "list of tables" …
	Says    string
	Example string
	Table   string // name of the table that it holds, "" for a plain value
}

// Schema describes every key that a formulary file may have.
func Schema() ([]Table, error) {
	file, err := parser.ParseFile(token.NewFileSet(), "record.go", recordSource, parser.ParseComments)
	if err != nil {
		return nil, err
	}
	records := map[string]*ast.StructType{}
	says := map[string]string{}
	for _, d := range file.Decls {
		g, ok := d.(*ast.GenDecl)
		if !ok || g.Tok != token.TYPE {
			continue
		}
		for _, s := range g.Specs {
			t, ok := s.(*ast.TypeSpec)
			if !ok {
				continue
			}
			if st, ok := t.Type.(*ast.StructType); ok {
				records[t.Name.Name] = st
				says[t.Name.Name] = sentence(g.Doc.Text(), t.Name.Name)
			}
		}
	}
	var out []Table
	err = describe("fileRecord", "", records, says, &out)
	return out, err
}

// describe adds the record's table, then those that it holds.
func describe(record, name string, records map[string]*ast.StructType, says map[string]string, out *[]Table) error {
	t := Table{Name: name, Says: says[record]}
	type inner struct{ record, name string }
	var below []inner
	for _, f := range records[record].Fields.List {
		key, err := keyOf(f)
		if err != nil {
			return fmt.Errorf("%s: %w", record, err)
		}
		text, example, ok := strings.Cut(strings.TrimSpace(f.Doc.Text()), " Example: ")
		if !ok {
			return fmt.Errorf("%s: the key %q has no example", record, key)
		}
		kind, of := kindOf(f.Type)
		field := Field{Key: key, Kind: kind, Says: text, Example: example}
		if of != "" {
			field.Table = strings.TrimPrefix(name+"."+key, ".")
			if of == "figureRecord" || of == "textRecord" || of == "diluentRecord" || of == "saltRecord" {
				field.Table = strings.TrimSuffix(of, "Record")
			}
			if _, done := find(*out, field.Table); !done {
				below = append(below, inner{of, field.Table})
			}
		}
		t.Fields = append(t.Fields, field)
	}
	*out = append(*out, t)
	for _, b := range below {
		if _, done := find(*out, b.name); done {
			continue
		}
		if err := describe(b.record, b.name, records, says, out); err != nil {
			return err
		}
	}
	return nil
}

func find(list []Table, name string) (Table, bool) {
	for _, t := range list {
		if t.Name == name {
			return t, true
		}
	}
	return Table{}, false
}

func keyOf(f *ast.Field) (string, error) {
	if f.Tag == nil {
		return "", fmt.Errorf("a field without a key")
	}
	tag, err := strconv.Unquote(f.Tag.Value)
	if err != nil {
		return "", err
	}
	key, ok := strings.CutPrefix(tag, `toml:"`)
	if !ok {
		return "", fmt.Errorf("got the tag %q, want a key", tag)
	}
	return strings.TrimSuffix(key, `"`), nil
}

// kindOf is the type in words, and the record that it holds.
func kindOf(x ast.Expr) (kind, record string) {
	switch t := x.(type) {
	case *ast.Ident:
		switch t.Name {
		case "string":
			return "text", ""
		case "bool":
			return "true or false", ""
		case "int64":
			return "whole number", ""
		}
		return "table", t.Name
	case *ast.StarExpr:
		return kindOf(t.X)
	case *ast.ArrayType:
		kind, record = kindOf(t.Elt)
		return "list of " + kind + "s", record
	case *ast.MapType:
		kind, record = kindOf(t.Value)
		return kind + " by name", record
	}
	return "value", ""
}

// sentence is a doc comment without the name of the type at its head.
func sentence(doc, name string) string {
	return strings.Join(strings.Fields(strings.TrimPrefix(doc, name+" is ")), " ")
}
