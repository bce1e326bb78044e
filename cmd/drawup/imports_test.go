package main

import (
	"go/ast"
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// mayImport is policy: which packages of this module a package may import.
// Arrows point down only. Never widen a line to make a build pass; change the
// design first.
func mayImport() map[string][]string {
	plan := []string{"dilution/body", "dilution/formulary", "dilution/order", "dilution/pump", "dilution/quantity",
		"dilution/refusal", "dilution/syringe"}
	said := append([]string{"dilution", "dilution/quantity/lint", "dilution/recheck", "labels/gs1"}, plan...)
	return map[string][]string{
		"cmd/drawup":                {"*"},
		"dilution":                  plan,
		"dilution/body":             {"dilution/quantity", "dilution/roots"},
		"dilution/certainty":        {"dilution/quantity", "dilution/syringe"},
		"dilution/formulary":        {"dilution/quantity", "dilution/refusal", "dilution/tomlfile", "dilution/body"},
		"dilution/formulary/verify": {"dilution/body", "dilution/formulary", "dilution/quantity", "dilution/quantity/lint", "dilution/refusal", "dilution/salts"},
		"dilution/order":            {"dilution/quantity", "dilution/quantity/lint", "dilution/refusal", "dilution/tomlfile", "dilution/body"},
		"dilution/pump":             {"dilution/quantity"},
		"dilution/quantity":         {},
		"dilution/quantity/lint":    {}, // judges the printer, so shares nothing with it
		"dilution/recheck":          {}, // the second route shares nothing
		"dilution/refusal":          {},
		"dilution/roots":            {},
		"dilution/salts":            {"dilution/quantity"},
		"dilution/syringe":          {"dilution/quantity", "dilution/roots"},
		"dilution/tomlfile":         {"dilution/refusal"},
		"dilution/twostep":          {"dilution/quantity", "dilution/syringe"},
		"fonts":                     {},
		"labels":                    said, // no page, no font, no PDF
		"labels/gs1":                {},
		"labels/gs1/generate":       {}, // run by go generate
		"labels/sheets":             append([]string{"labels"}, said...),
		"layouts":                   {"labels", "labels/gs1", "labels/sheets", "layouts/ink", "fonts", "dilution/refusal", "dilution/recheck"},
		"layouts/ink":               {},
		"layouts/pdf":               {"layouts/ink", "fonts"},
		"layouts/pdf/readback":      {"layouts/ink"}, // from tests only

		"dilution/formulary/published": {"dilution/formulary"}, // from tests only
	}
}

const module = "drawup"

// onlyFromTests lists packages that no shipped code may import.
func onlyFromTests() []string {
	return []string{"layouts/pdf/readback", "dilution/formulary/published"}
}

// goFiles lists the Go files of the module by package folder.
func goFiles(t *testing.T, tests bool) map[string][]string {
	t.Helper()
	root := filepath.Join("..", "..")
	out := map[string][]string{}
	err := filepath.WalkDir(root, func(path string, d fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		if d.IsDir() && path != root && (strings.HasPrefix(d.Name(), ".") || d.Name() == "testdata") {
			return filepath.SkipDir
		}
		if !strings.HasSuffix(path, ".go") || strings.HasSuffix(path, "_test.go") != tests {
			return nil
		}
		rel, err := filepath.Rel(root, filepath.Dir(path))
		if err != nil {
			return err
		}
		dir := filepath.ToSlash(rel)
		out[dir] = append(out[dir], path)
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	return out
}

func importsOf(t *testing.T, file string) []string {
	t.Helper()
	f, err := parser.ParseFile(token.NewFileSet(), file, nil, parser.ImportsOnly)
	if err != nil {
		t.Fatal(err)
	}
	var out []string
	for _, i := range f.Imports {
		path, err := strconv.Unquote(i.Path.Value)
		if err != nil {
			t.Fatal(err)
		}
		if own, ok := strings.CutPrefix(path, module+"/"); ok {
			out = append(out, own)
		}
	}
	return out
}

func TestArrowsPointDown(t *testing.T) {
	policy, found := mayImport(), goFiles(t, false)
	for dir, files := range found {
		allowed, ok := policy[dir]
		if !ok {
			t.Errorf("package %s has no line in the table", dir)
			continue
		}
		for _, file := range files {
			for _, own := range importsOf(t, file) {
				if slices.Contains(onlyFromTests(), own) {
					t.Errorf("%s imports %s, which is for tests", file, own)
				}
				if !slices.Contains(allowed, own) && !slices.Contains(allowed, "*") {
					t.Errorf("%s: package %s may not import %s", file, dir, own)
				}
			}
		}
	}
	for dir, allowed := range policy {
		if _, ok := found[dir]; !ok {
			t.Errorf("the table has a line for %s, which does not exist", dir)
		}
		for _, own := range allowed {
			if _, ok := found[own]; !ok && own != "*" {
				t.Errorf("the line of %s names %s, which does not exist", dir, own)
			}
		}
	}
}

// TestTopLevel holds the fixed top level of the module.
func TestTopLevel(t *testing.T) {
	fixed := []string{"cmd", "labels", "dilution", "layouts", "fonts", "testdata", "go.mod", "go.sum", "README.md", "DEVELOPERS.md"}
	entries, err := os.ReadDir(filepath.Join("..", ".."))
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range entries {
		if e.Name() == "out" {
			continue // what README's first command writes; never tracked
		}
		if !strings.HasPrefix(e.Name(), ".") && !slices.Contains(fixed, e.Name()) {
			t.Errorf("%s does not belong to the top level", e.Name())
		}
	}
}

// TestExportedNamesAreExplained wants a doc comment on every exported name of
// the module. A comment on a group of names serves the whole group.
func TestExportedNamesAreExplained(t *testing.T) {
	for dir, files := range goFiles(t, false) {
		explained := false
		for _, file := range files {
			set := token.NewFileSet()
			f, err := parser.ParseFile(set, file, nil, parser.ParseComments|parser.SkipObjectResolution)
			if err != nil {
				t.Fatal(err)
			}
			explained = explained || f.Doc != nil
			for _, name := range unexplained(set, f) {
				t.Errorf("%s: %s has no doc comment", file, name)
			}
		}
		if !explained {
			t.Errorf("package %s has no comment", dir)
		}
	}
}

// unexplained lists exported names without a comment. Runs of one-line
// functions under one comment, with no blank line between, count as a group, and so do Error,
// String and Unwrap; methods of hidden types need none.
func unexplained(set *token.FileSet, f *ast.File) []string {
	var out []string
	line := func(p token.Pos) int { return set.Position(p).Line }
	commented := -1 // last line of the last explained declaration
	for _, d := range f.Decls {
		switch d := d.(type) {
		case *ast.FuncDecl:
			if d.Doc != nil || !d.Name.IsExported() || customary(d.Name.Name) || ofHiddenType(d) {
				commented = line(d.End())
				continue
			}
			if line(d.Pos()) == commented+1 {
				commented = line(d.End())
				continue
			}
			out = append(out, d.Name.Name)
			commented = -1
		case *ast.GenDecl:
			commented = -1
			if d.Tok == token.IMPORT || d.Doc != nil {
				if d.Doc != nil {
					commented = line(d.End())
				}
				continue
			}
			out = append(out, unexplainedSpecs(d)...)
		}
	}
	return out
}

func customary(name string) bool {
	return slices.Contains([]string{"Error", "String", "Unwrap"}, name)
}

// ofHiddenType reports a method whose type is not exported.
func ofHiddenType(d *ast.FuncDecl) bool {
	if d.Recv == nil || len(d.Recv.List) != 1 {
		return false
	}
	typ := d.Recv.List[0].Type
	if star, ok := typ.(*ast.StarExpr); ok {
		typ = star.X
	}
	name, ok := typ.(*ast.Ident)
	return ok && !name.IsExported()
}

func unexplainedSpecs(d *ast.GenDecl) []string {
	var out []string
	for _, s := range d.Specs {
		switch s := s.(type) {
		case *ast.TypeSpec:
			if s.Name.IsExported() && s.Doc == nil && s.Comment == nil {
				out = append(out, s.Name.Name)
			}
		case *ast.ValueSpec:
			for _, n := range s.Names {
				if n.IsExported() && s.Doc == nil && s.Comment == nil {
					out = append(out, n.Name)
				}
			}
		}
	}
	return out
}
