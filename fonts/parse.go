package fonts

import (
	"encoding/binary"
	"fmt"
)

// table is one table of a TrueType file. Reading past its end gives zero and
// is noted, so that a parser may check once at its end.
type table struct {
	bytes []byte
	short *bool // set when a read fell outside
}

func (t table) u16(at int) int {
	if at < 0 || at+2 > len(t.bytes) {
		*t.short = true
		return 0
	}
	return int(binary.BigEndian.Uint16(t.bytes[at:]))
}

func (t table) i16(at int) int64 {
	return int64(int16(t.u16(at)))
}

func (t table) u32(at int) int {
	return t.u16(at)<<16 | t.u16(at+2)
}

// parse reads the metrics of a TrueType file (OpenType specification 1.9:
// head, hhea, hmtx, maxp, OS/2, cmap, loca, glyf).
func parse(file []byte) (*Face, error) {
	tables, err := split(file)
	if err != nil {
		return nil, err
	}
	head, hhea, os2 := tables["head"], tables["hhea"], tables["OS/2"]
	face := &Face{
		file:       file,
		unitsPerEm: int64(head.u16(18)),
		ascent:     hhea.i16(4),
		descent:    -hhea.i16(6),
		xHeight:    os2.i16(86),
		capHeight:  os2.i16(88),
	}
	if face.unitsPerEm <= 0 || face.capHeight <= 0 || face.xHeight <= 0 || face.ascent <= 0 || face.descent < 0 {
		return nil, fmt.Errorf("font metrics: got em %d, capital %d, x %d, ascender %d, descender %d, want positive numbers",
			face.unitsPerEm, face.capHeight, face.xHeight, face.ascent, face.descent)
	}
	glyphs := readGlyphs(tables)
	if len(glyphs) == 0 {
		return nil, fmt.Errorf("font glyphs: got none, want at least the empty box")
	}
	face.notdef = glyphs[0]
	face.glyphs, err = readCmap(tables["cmap"], glyphs)
	if err != nil {
		return nil, err
	}
	for _, t := range tables {
		if *t.short {
			return nil, fmt.Errorf("font file: got a table that ends too early, want whole tables")
		}
	}
	return face, nil
}

// split finds the tables that measuring needs.
func split(file []byte) (map[string]table, error) {
	short := new(bool)
	whole := table{bytes: file, short: short}
	tables := map[string]table{}
	for i := range whole.u16(4) {
		record := 12 + 16*i
		start, size := whole.u32(record+8), whole.u32(record+12)
		if *short || start < 0 || size < 0 || start+size > len(file) {
			return nil, fmt.Errorf("font table %d: got bytes %d to %d, want within %d", i, start, start+size, len(file))
		}
		name := string(file[record : record+4])
		tables[name] = table{bytes: file[start : start+size], short: short}
	}
	for _, name := range []string{"head", "hhea", "hmtx", "maxp", "OS/2", "cmap", "loca", "glyf"} {
		if _, ok := tables[name]; !ok {
			return nil, fmt.Errorf("font file: got no table %q, want one", name)
		}
	}
	return tables, nil
}

// readGlyphs returns advance and vertical extent of every glyph by number.
func readGlyphs(tables map[string]table) []glyph {
	head, hhea, hmtx := tables["head"], tables["hhea"], tables["hmtx"]
	loca, outlines := tables["loca"], tables["glyf"]
	long := head.u16(50) == 1
	offset := func(i int) int {
		if long {
			return loca.u32(4 * i)
		}
		return 2 * loca.u16(2*i)
	}
	lastMetric := hhea.u16(34) - 1
	glyphs := make([]glyph, tables["maxp"].u16(4))
	for i := range glyphs {
		glyphs[i].advance = int64(hmtx.u16(4 * min(i, lastMetric)))
		if start := offset(i); start < offset(i+1) {
			glyphs[i].yMin = outlines.i16(start + 4)
			glyphs[i].yMax = outlines.i16(start + 8)
		}
	}
	return glyphs
}

// readCmap reads the Unicode mapping of the basic plane: platform 3, encoding
// 1, format 4.
func readCmap(cmap table, glyphs []glyph) (map[rune]glyph, error) {
	for i := range cmap.u16(2) {
		record := 4 + 8*i
		if cmap.u16(record) != 3 || cmap.u16(record+2) != 1 {
			continue
		}
		at := cmap.u32(record + 4)
		if format := cmap.u16(at); format != 4 {
			return nil, fmt.Errorf("font character map: got format %d, want 4", format)
		}
		return readSegments(cmap, at, glyphs), nil
	}
	return nil, fmt.Errorf("font character map: got none for platform 3 encoding 1, want one")
}

// readSegments walks the four parallel arrays of a format 4 map and keeps the
// runes that Covers may answer for.
func readSegments(cmap table, at int, glyphs []glyph) map[rune]glyph {
	found := map[rune]glyph{}
	twice := cmap.u16(at + 6) // segCountX2
	ends, starts := at+14, at+16+twice
	deltas, ranges := starts+twice, starts+2*twice
	for seg := 0; seg < twice; seg += 2 {
		first, last := cmap.u16(starts+seg), cmap.u16(ends+seg)
		delta, shift := cmap.u16(deltas+seg), cmap.u16(ranges+seg)
		for code := first; code <= last && code < 0xFFFF; code++ {
			index := code
			if shift != 0 {
				index = cmap.u16(ranges + seg + shift + 2*(code-first))
				if index == 0 {
					continue
				}
			}
			index = (index + delta) & 0xFFFF
			if index > 0 && index < len(glyphs) && drawable(rune(code)) {
				found[rune(code)] = glyphs[index]
			}
		}
	}
	return found
}
