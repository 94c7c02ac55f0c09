package inventory

import (
	"math"
	"strings"
	"testing"
)

// Whatever a file holds, reading it ends in a table or an error, and what is
// read of its rows is finite and within its bottle.
func FuzzReadTable(f *testing.F) {
	f.Add("Name,CAS,Size\nAcetone,67-64-1,1 L\n")
	f.Add(messyList)
	f.Add("name;amount\n\"a\"\"b\";2,5 kg\n")
	f.Add("PK\x03\x04rubbish")
	f.Add("\xff\xfen\x00a\x00")
	f.Add("name,size,remaining,received\nHCl 37 %,2 x 500 mL,1/2,03/04/2026\n")
	f.Fuzz(func(t *testing.T, data string) {
		table, err := ReadTable("fuzz", strings.NewReader(data))
		if err != nil {
			return
		}
		reader := newRowReader(table, Match(table))
		for i := range table.Rows {
			d, faults := reader.read(i)
			if len(faults) > 0 {
				continue
			}
			if d.bottle.Size <= 0 || d.bottle.Content < 0 || d.bottle.Content > d.bottle.Size || d.bottles < 1 {
				t.Errorf("row %q gives %+v", table.Rows[i], d)
			}
			if low, high := d.form.AssayLow, d.form.AssayHigh; !(low >= 0 && low <= high && high <= 1) || math.IsNaN(d.form.DensityGML) {
				t.Errorf("row %q gives the form %+v", table.Rows[i], d.form)
			}
		}
	})
}

// A code that passes is written as codes are made.
func FuzzNormalCode(f *testing.F) {
	f.Add("B7K2QM")
	f.Add(MakeCode(BottleCode, 77))
	f.Add(" b-0 0")
	f.Fuzz(func(t *testing.T, text string) {
		code, err := NormalCode(text)
		if err != nil {
			return
		}
		if again, err := NormalCode(code); err != nil || again != code {
			t.Errorf("NormalCode(%q) = %q, which reads as %q, %v", text, code, again, err)
		}
	})
}
