package quantity

// Exact is the exact amount in unit u: a decimal if it ends, else a fraction in
// lowest terms such as "28/3". It is "" if nothing is given or u counts in
// another way.
func (a Amount) Exact(u Unit) string { return in(a.x, a.kind, u).text() }

// Exact is the exact amount per mL in unit u, written as [Amount.Exact] does.
func (c Concentration) Exact(u Unit) string { return in(c.x, c.kind, u).text() }

// in is x, counted by k, in unit u; not given if u counts in another way.
func in(x exact, k Kind, u Unit) exact {
	if k != u.kind {
		return exact{}
	}
	return x.quo(u.scale)
}

// Exact is the exact dose in its own unit, written as [Amount.Exact] does.
func (d Dose) Exact() string { return d.inOwnUnit().text() }

func (d Dose) inOwnUnit() exact { return d.x.quo(d.unit.scale) }

// Exact is the exact dose rate in its own unit and period, written as
// [Amount.Exact] does.
func (d DoseRate) Exact() string { return d.inOwnUnit().text() }

func (d DoseRate) inOwnUnit() exact { return d.x.quo(d.unit.scale).quo(d.period.perHour()) }

// Exact is the exact volume in mL, written as [Amount.Exact] does.
func (v Volume) Exact() string { return v.x.text() }

// Exact is the exact flow rate in mL/h, written as [Amount.Exact] does.
func (f FlowRate) Exact() string { return f.x.text() }

// Exact is the exact body weight in kg, written as [Amount.Exact] does.
func (w BodyWeight) Exact() string { return w.x.text() }

// Exact is the exact surface area in m², written as [Amount.Exact] does.
func (s BodySurfaceArea) Exact() string { return s.x.text() }

// Exact is the exact height in cm, written as [Amount.Exact] does.
func (l Length) Exact() string { return l.x.text() }

// Exact is the exact share in per cent, written as [Amount.Exact] does.
func (p Percent) Exact() string { return p.x.text() }
