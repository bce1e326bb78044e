package quantity

// Cmp compares two values: -1, 0 or +1. Values of unlike kind or basis give an
// error; so does a value that is not given.
func (a Amount) Cmp(b Amount) (int, error) {
	if err := sameKind(a.kind, b.kind); err != nil {
		return 0, err
	}
	return a.x.cmp(b.x), nil
}

// Cmp compares two volumes, both given.
func (v Volume) Cmp(w Volume) int { return v.x.cmp(w.x) }

// Cmp compares two concentrations of one kind.
func (c Concentration) Cmp(d Concentration) (int, error) {
	if err := sameKind(c.kind, d.kind); err != nil {
		return 0, err
	}
	return c.x.cmp(d.x), nil
}

// Cmp compares two doses of one kind and basis.
func (d Dose) Cmp(e Dose) (int, error) {
	if err := sameKind(d.kind, e.kind); err != nil {
		return 0, err
	}
	if d.basis != e.basis {
		return 0, &BasisError{Got: d.basis, Want: e.basis}
	}
	return d.x.cmp(e.x), nil
}

// Cmp compares two dose rates of one kind and basis, whatever their period.
func (d DoseRate) Cmp(e DoseRate) (int, error) {
	if err := sameKind(d.kind, e.kind); err != nil {
		return 0, err
	}
	if d.basis != e.basis {
		return 0, &BasisError{Got: d.basis, Want: e.basis}
	}
	return d.x.cmp(e.x), nil
}

// Cmp compares two flow rates, both given.
func (f FlowRate) Cmp(g FlowRate) int { return f.x.cmp(g.x) }

// Cmp compares two body weights, both given.
func (w BodyWeight) Cmp(o BodyWeight) int { return w.x.cmp(o.x) }

// Cmp compares two heights, both given.
func (l Length) Cmp(m Length) int { return l.x.cmp(m.x) }

// Equal reports whether both are given and the same.
func (c Concentration) Equal(d Concentration) bool {
	n, err := c.Cmp(d)
	return err == nil && n == 0
}

// Equal reports whether both are given and the same.
func (a Amount) Equal(b Amount) bool {
	n, err := a.Cmp(b)
	return err == nil && n == 0
}

// Exact is the exact value in unit u as text: a decimal if it ends, else a
// fraction such as "28/3".
func (a Amount) Exact(u Unit) string { return a.x.quo(u.scale).text() }

// Exact is the exact value per mL in unit u.
func (c Concentration) Exact(u Unit) string { return c.x.quo(u.scale).text() }

// Exact is the exact value in the dose's own unit.
func (d Dose) Exact() string { return d.x.quo(d.unit.scale).text() }

// Exact is the exact value in the dose rate's own unit and period.
func (d DoseRate) Exact() string { return d.inOwnUnit().text() }

func (d DoseRate) inOwnUnit() exact { return d.x.quo(d.unit.scale).quo(d.period.perHour()) }

// Exact is the exact value in mL, mL/h, kg, m², cm or per cent.
func (v Volume) Exact() string          { return v.x.text() }
func (f FlowRate) Exact() string        { return f.x.text() }
func (w BodyWeight) Exact() string      { return w.x.text() }
func (s BodySurfaceArea) Exact() string { return s.x.text() }
func (l Length) Exact() string          { return l.x.text() }
func (p Percent) Exact() string         { return p.x.text() }
