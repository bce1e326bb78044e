package order

// The records mirror the shelf file key by key, as those of the order do.

type shelfFile struct {
	Shelf   shelfRecord    `toml:"shelf"`
	Stock   []stockRecord  `toml:"stock"`
	Barrels []barrelRecord `toml:"barrel"`
	Fluids  []fluidRecord  `toml:"diluent"`
	Pumps   []pumpRecord   `toml:"pump"`
}

type shelfRecord struct {
	Name     string `toml:"name"`
	Invented bool   `toml:"invented"`
	Needle   string `toml:"needle_dead_space"`
}

type stockRecord struct {
	Drug         string `toml:"drug"`
	Presentation string `toml:"presentation"`
	Count        any    `toml:"count"`
}

type barrelRecord struct {
	Size      string `toml:"size"`
	Step      string `toml:"step"`
	DeadSpace string `toml:"dead_space"`
}

type fluidRecord struct {
	Name      string `toml:"name"`
	Container string `toml:"container"`
	Volume    string `toml:"volume"`
	Count     any    `toml:"count"`
}

type pumpRecord struct {
	Name  string   `toml:"name"`
	Takes []string `toml:"takes"`
}

// shelfKeys lists every key of the records with its table; a test holds the two
// together.
func shelfKeys() []string {
	var keys []string
	for _, t := range []struct {
		table string
		names []string
	}{
		{"shelf", []string{"name", "invented", "needle_dead_space"}},
		{"stock", []string{"drug", "presentation", "count"}},
		{"barrel", []string{"size", "step", "dead_space"}},
		{"diluent", []string{"name", "container", "volume", "count"}},
		{"pump", []string{"name", "takes"}},
	} {
		keys = append(keys, t.table)
		for _, name := range t.names {
			keys = append(keys, t.table+"."+name)
		}
	}
	return keys
}
