package main

import (
	"testing"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
)

// benchOrder is the demonstration order, cut to its first n syringes.
func benchOrder(b *testing.B, n int) (order.Order, *formulary.Formulary) {
	b.Helper()
	f, err := formulary.Default()
	if err != nil {
		b.Fatal(err)
	}
	data, faults := readFile(demo)
	if faults.Refused() {
		b.Fatal(faults)
	}
	o, faults := order.Read(demo, data)
	if faults.Refused() {
		b.Fatal(faults)
	}
	o.Syringes = o.Syringes[:n]
	return o, f
}

func benchPlan(b *testing.B, n int) {
	o, f := benchOrder(b, n)
	b.ReportAllocs()
	for b.Loop() {
		if _, reasons := dilution.NewList(o, f, o.Session.Prepared.Value, nil, nil); reasons.Refused() {
			b.Fatal(reasons)
		}
	}
}

// One syringe, from a read order to a plan.
func BenchmarkOnePlan(b *testing.B) { benchPlan(b, 1) }

// Fifteen syringes, from a read order to plans.
func BenchmarkFifteenPlans(b *testing.B) { benchPlan(b, 15) }

// The starter formulary, from its text.
func BenchmarkFormulary(b *testing.B) {
	texts, err := formulary.DefaultTexts()
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		if _, faults := formulary.Read(texts...); faults.Refused() {
			b.Fatal(faults)
		}
	}
}

// The whole demonstration list: read, planned, worded, passed by the second
// route, placed and written as PDF, in memory.
func BenchmarkPrepareDemo(b *testing.B) {
	f, err := formulary.Default()
	if err != nil {
		b.Fatal(err)
	}
	flags, _ := readPaperFlags("prepare", nil)
	b.ReportAllocs()
	size := 0
	for b.Loop() {
		j, reasons := newJob(demo, library{form: f}, flags.when(nil), nil, silent)
		if reasons.Refused() {
			b.Fatal(reasons)
		}
		files, reasons := flags.papers(j, ".", nil)
		if reasons.Refused() {
			b.Fatal(reasons)
		}
		size = 0
		for _, x := range files {
			size += len(x.data)
		}
	}
	b.ReportMetric(float64(size), "bytes/list")
}
