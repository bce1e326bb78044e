package quantity

// Cmp compares two amounts: -1, 0 or +1. Error: *KindError if they are counted
// in unlike ways or one is not given.
func (a Amount) Cmp(b Amount) (int, error) {
	if err := sameKind(a.kind, b.kind); err != nil {
		return 0, err
	}
	return a.x.cmp(b.x), nil
}

// Cmp compares two volumes: -1, 0 or +1. Both must be given; there is no answer
// to fall back on, so ask Given first.
func (v Volume) Cmp(w Volume) int { return v.x.cmp(w.x) }

// Cmp compares two concentrations: -1, 0 or +1. Error: *KindError if they are
// counted in unlike ways or one is not given.
func (c Concentration) Cmp(d Concentration) (int, error) {
	if err := sameKind(c.kind, d.kind); err != nil {
		return 0, err
	}
	return c.x.cmp(d.x), nil
}

// Cmp compares two doses: -1, 0 or +1. Errors: *KindError if they are counted
// in unlike ways or one is not given; *BasisError.
func (d Dose) Cmp(e Dose) (int, error) {
	if err := sameKind(d.kind, e.kind); err != nil {
		return 0, err
	}
	if d.basis != e.basis {
		return 0, &BasisError{Got: d.basis, Want: e.basis}
	}
	return d.x.cmp(e.x), nil
}

// Cmp compares two dose rates, whatever their period: -1, 0 or +1. Errors:
// *KindError if they are counted in unlike ways or one is not given;
// *BasisError.
func (d DoseRate) Cmp(e DoseRate) (int, error) {
	if err := sameKind(d.kind, e.kind); err != nil {
		return 0, err
	}
	if d.basis != e.basis {
		return 0, &BasisError{Got: d.basis, Want: e.basis}
	}
	return d.x.cmp(e.x), nil
}

// Cmp compares two flow rates: -1, 0 or +1. Both must be given; there is no answer
// to fall back on, so ask Given first.
func (f FlowRate) Cmp(g FlowRate) int { return f.x.cmp(g.x) }

// Cmp compares two body weights: -1, 0 or +1. Both must be given; there is no answer
// to fall back on, so ask Given first.
func (w BodyWeight) Cmp(o BodyWeight) int { return w.x.cmp(o.x) }

// Cmp compares two heights: -1, 0 or +1. Both must be given; there is no answer
// to fall back on, so ask Given first.
func (l Length) Cmp(m Length) int { return l.x.cmp(m.x) }

// Equal reports whether both concentrations are given and the same.
func (c Concentration) Equal(d Concentration) bool {
	n, err := c.Cmp(d)
	return err == nil && n == 0
}

// Equal reports whether both amounts are given and the same.
func (a Amount) Equal(b Amount) bool {
	n, err := a.Cmp(b)
	return err == nil && n == 0
}
