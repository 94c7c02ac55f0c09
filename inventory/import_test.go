package inventory

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"github.com/xuri/excelize/v2"
)

// A list as labs keep them: a title above, units in headings and cells, German
// decimals, hydrates by name, slips. CAS numbers are those of the embedded table.
const messyList = `Chemical inventory of the teaching lab;;;;;;;;
;;;;;;;;
Chemical name;CAS No.;Purity;Pack size;Remaining;Location;Exp. date;Lot;Inventory no.
Sodium dichromate dihydrate;7789-12-0;99,5%;500g;ca. 1/2;Store room > Oxidisers > shelf 1;03/2027;L1;A-1
Sulfuric acid 95-98%;7664-93-9;;2,5 L;1,2 L;Acids;14.03.2028;;A-2
Ethyl acetate;141-78-6;≥ 99.5 %;2 x 1 L;;Flammables;2028-01;;
Hydrochloric acid;7647-01-0;37 %;2.5 L;full;Acids;;;A-3
Sodium chloride;7647-14-6;99 %;1 kg;;Salts;;;A-4
1-pentanol;111-27-3;99 %;500 mL;;Flammables;;;A-5
Acetone;67-64-1;99.5;5 L;;Flammables;;;A-1
Cyclohexanol;108-93-0;99 %;1,234 g;;Flammables;;;A-6
Magnesium sulfate heptahydrate;;99%;1 kg;nearly full;Salts;31.02.2027;;A-7
Toluene;108-88-3;99%;1000;;Flammables;;;A-8
Sodium sulphate decahydrate;7727-73-3;99%;1 kg;80 %;Salts;;;A-9
Ethyl acetate;141-78-6;≥ 99.5 %;2 x 1 L;;Flammables;2028-01;;
House blend buffer;;;1 L;;Bench;;;A-10
`

func TestImportMessyList(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		table, err := ReadTable("list.csv", strings.NewReader(messyList))
		if err != nil {
			t.Fatal(err)
		}
		m := Match(table)
		if len(m.Questions) > 0 || len(m.Unused) > 0 {
			t.Errorf("questions %q, unused %q", m.Questions, m.Unused)
		}
		report, err := s.Import(ctx, table, m, ImportOptions{Act: clerk})
		if err != nil {
			t.Fatal(err)
		}
		wantRefused := map[int]string{
			8:  "the check digit doesn't fit",
			9:  "the name says 1-pentanol",
			10: "is on line 4 too",
			11: "may be a decimal sign or part thousands",
			12: "there is no such day",
			13: "no unit",
			15: "the same as line 6",
		}
		for _, r := range report.Refused {
			want, ok := wantRefused[r.Line]
			if !ok || !strings.Contains(strings.Join(r.Why, "; "), want) {
				t.Errorf("line %d refused: %q, want %q", r.Line, r.Why, want)
			}
			delete(wantRefused, r.Line)
		}
		if len(wantRefused) > 0 {
			t.Errorf("not refused: %v", wantRefused)
		}
		if report.Taken != 6 || report.Bottles != 7 || report.Rows != 13 {
			t.Errorf("read %d, taken %d rows and %d bottles", report.Rows, report.Taken, report.Bottles)
		}
		checkMessyStock(t, s)
		if _, err := s.Import(ctx, table, m, ImportOptions{Act: clerk}); !errors.Is(err, ErrDuplicate) {
			t.Errorf("the same list again: %v", err)
		}
		mustCheck(t, s)
	})
}

func checkMessyStock(t *testing.T, s *Store) {
	t.Helper()
	shelf, err := s.Load(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	for mark, want := range map[string]struct {
		substance, form string
		waters          float64
		low, high       float64
		content, size   int64
		by              MeasuredBy
		density         float64
	}{
		"A-1":  {"sodium dichromate", "sodium dichromate dihydrate 99.5 %", 2, .995, .995, g(250), g(500), ByGuess, 0},
		"A-2":  {"sulfuric acid", "sulfuric acid 95–98 %, by volume", 0, .95, .98, mL(1200), mL(2500), ByLedger, 1.8361},
		"A-3":  {"hydrochloric acid", "hydrochloric acid 37 %, by volume", 0, .37, .37, mL(2500), mL(2500), ByLevel, 1.1837},
		"A-9":  {"sodium sulfate", "sodium sulfate decahydrate 99 %", 10, .99, .99, g(800), g(1000), ByLevel, 0},
		"A-10": {"House blend buffer", "House blend buffer, by volume", 0, 0, 0, mL(1000), mL(1000), ByUnopened, 0},
	} {
		found := false
		for _, b := range shelf.Bottles {
			if b.Mark != mark {
				continue
			}
			found = true
			form, _ := shelf.Form(b.FormID)
			substance, _ := shelf.SubstanceByID(form.SubstanceID)
			if substance.Name != want.substance || form.Name != want.form || form.HydrateWaters != want.waters ||
				form.AssayLow != want.low || form.AssayHigh != want.high || b.Content != want.content || b.Size != want.size || b.MeasuredBy != want.by {
				t.Errorf("%s:\n got %+v\n%+v\n%+v\nwant %+v", mark, substance, form, b, want)
			}
			// Densities: CRC Handbook 102nd ed. tables, 96.5 % and 37 % by interpolation.
			if math.Abs(form.DensityGML-want.density) > .002 {
				t.Errorf("%s: density %v, want %v", mark, form.DensityGML, want.density)
			}
		}
		if !found {
			t.Errorf("%s isn't in stock", mark)
		}
	}
}

func TestImportRefusedFile(t *testing.T) {
	s := openIn(t, t.TempDir())
	table, err := ReadTable("x.csv", strings.NewReader("name,amount,note\r\nAcetone,5 L,=cmd()\r\nAcetone,5 foo,=cmd()\r\n"))
	if err != nil {
		t.Fatal(err)
	}
	report, err := s.Import(context.Background(), table, Match(table), ImportOptions{Act: clerk})
	if err != nil {
		t.Fatal(err)
	}
	var out bytes.Buffer
	if err := report.WriteRefused(&out); err != nil {
		t.Fatal(err)
	}
	want := "line,why not taken,name,amount,note\r\n3,\"amount \"\"5 foo\"\": unknown unit \"\"foo\"\"; want g, kg, mL or L\",Acetone,5 foo,'=cmd()\r\n"
	if got := out.String(); got != want {
		t.Errorf("got\n%s\nwant\n%s", got, want)
	}
}

func TestImportPreviewAndUndo(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		before, _ := s.Load(ctx)
		table, err := ReadTable("y.csv", strings.NewReader("name,amount,number of bottles,location\nAcetone,5 L,2,Flammables\nn-Heptane,1 L,,Nowhere known\n"))
		if err != nil {
			t.Fatal(err)
		}
		report, err := s.Import(ctx, table, Match(table), ImportOptions{Act: clerk, Preview: true})
		if err != nil || report.Taken != 2 || report.Bottles != 3 || report.Import != 0 {
			t.Errorf("preview: %+v, %v", report, err)
		}
		if after, _ := s.Load(ctx); len(after.Bottles) != len(before.Bottles) || len(after.Places) != len(before.Places) {
			t.Error("a preview changed the stock")
		}
		report, err = s.Import(ctx, table, Match(table), ImportOptions{Act: clerk})
		if err != nil || report.Import == 0 {
			t.Fatalf("import: %+v, %v", report, err)
		}
		var first string
		s.reader.Raw("SELECT min(code) FROM bottles WHERE import_id = ?", report.Import).Row().Scan(&first)
		if states, err := s.States(ctx, first); err != nil || len(states) != 1 || states[0].State != Sealed || states[0].ByWhom != clerk.By {
			t.Errorf("states of an imported bottle: %+v, %v", states, err)
		}
		if err := s.UndoImport(ctx, report.Import, clerk); err != nil {
			t.Fatal(err)
		}
		if states, err := s.States(ctx, first); err != nil || len(states) != 2 || states[1].State != Sealed || states[0].State != Discarded {
			t.Errorf("states after the undo: %+v, %v", states, err)
		}
		after, _ := s.Load(ctx)
		for _, b := range after.Bottles[len(before.Bottles):] {
			if b.State != Discarded || b.Content != 0 {
				t.Errorf("after the undo: %+v", b)
			}
		}
		if err := s.UndoImport(ctx, report.Import, clerk); !errors.Is(err, ErrDuplicate) {
			t.Errorf("undone twice: %v", err)
		}
		mustCheck(t, s)
		// Undone, it may be taken again; used, it can't be undone.
		report, err = s.Import(ctx, table, Match(table), ImportOptions{Act: clerk})
		if err != nil {
			t.Fatal(err)
		}
		var code string
		s.reader.Raw("SELECT max(code) FROM bottles WHERE import_id = ?", report.Import).Row().Scan(&code)
		if _, err := s.Draw(ctx, Taking{code, 1, 0}, clerk); err != nil {
			t.Fatal(err)
		}
		if err := s.UndoImport(ctx, report.Import, clerk); !errors.Is(err, ErrInUse) {
			t.Errorf("undone after use: %v", err)
		}
	})
}

func TestMatchAsksForTheOrderOfDates(t *testing.T) {
	for dates, want := range map[string]struct {
		questions int
		first     Date // what the first row becomes; 0 for refused
	}{
		"03/04/2026\n05/06/2026": {1, 0},
		"03/04/2026\n25/04/2026": {0, NewDate(2026, 4, 3)},
		"03/04/2026\n04/25/2026": {0, NewDate(2026, 3, 4)},
		"25/04/2026\n04/25/2026": {0, NewDate(2026, 4, 25)},
		"05/05/2026\n06/06/2026": {0, NewDate(2026, 5, 5)},
	} {
		rows := strings.Split(dates, "\n")
		table, err := ReadTable("d.csv", strings.NewReader("name,amount,received\nAcetone,1 L,"+rows[0]+"\nAcetone,2 L,"+rows[1]+"\n"))
		if err != nil {
			t.Fatal(err)
		}
		m := Match(table)
		if len(m.Questions) != want.questions {
			t.Errorf("%q: questions %q", dates, m.Questions)
		}
		d, faults := newRowReader(table, m).read(0)
		if d.bottle.Received != want.first || (want.first == 0) != (len(faults) > 0) {
			t.Errorf("%q: %s, %q, want %s", dates, d.bottle.Received, faults, want.first)
		}
		m.DayFirst = "month"
		if d, _ = newRowReader(table, m).read(0); want.questions > 0 && d.bottle.Received != NewDate(2026, 3, 4) {
			t.Errorf("%q answered: %s", dates, d.bottle.Received)
		}
	}
}

func TestParseAmount(t *testing.T) {
	nan := math.NaN()
	for _, c := range []struct {
		cell, unit string
		want       amountCell
	}{
		{"2.5 L", "", amountCell{mL(2500), nan, ByVolume, 1, false}},
		{"2,5 l", "", amountCell{mL(2500), nan, ByVolume, 1, false}},
		{"500g", "", amountCell{g(500), nan, ByMass, 1, false}},
		{"25 Kg", "", amountCell{g(25000), nan, ByMass, 1, false}},
		{"500", "mL", amountCell{mL(500), nan, ByVolume, 1, false}},
		{"ca. 1/2", "", amountCell{0, .5, "", 1, true}},
		{"~ 200 mL", "", amountCell{mL(200), nan, ByVolume, 1, true}},
		{"half", "", amountCell{0, .5, "", 1, false}},
		{"75 %", "", amountCell{0, .75, "", 1, false}},
		{"3/4 full", "", amountCell{0, .75, "", 1, false}},
		{"2 x 500 mL", "", amountCell{mL(500), nan, ByVolume, 2, false}},
		{"100 pcs", "", amountCell{100, nan, ByCount, 1, false}},
		{"0.1 mg", "", amountCell{100, nan, ByMass, 1, false}},
	} {
		got, err := parseAmount(c.cell, c.unit)
		if err != nil || fmt.Sprint(got) != fmt.Sprint(c.want) {
			t.Errorf("parseAmount(%q, %q) = %v, %v, want %v", c.cell, c.unit, got, err, c.want)
		}
	}
	for _, bad := range []string{"", "1,234 g", "five", "5 foo", "-3 g", "5", "1 kg 200 g", "1e400 g", "NaN g", "1.5 pcs"} {
		if got, err := parseAmount(bad, ""); err == nil {
			t.Errorf("parseAmount(%q) = %v, want it refused", bad, got)
		}
	}
}

func TestParseStrength(t *testing.T) {
	for cell, want := range map[string]strengthCell{
		"98%": {.98, .98}, "98 %": {.98, .98}, "98": {.98, .98}, "0.98": {.98, .98}, "95-98%": {.95, .98}, "95–98 %": {.95, .98},
		"≥ 99 %": {.99, 1}, ">99%": {.99, 1}, "99+ %": {.99, 1}, "99%+": {.99, 1}, "37 % w/w": {.37, .37}, "99,5 %": {.995, .995}, "min. 98 %": {.98, 1},
	} {
		if got, err := parseStrength(cell, ""); err != nil || math.Abs(got.low-want.low) > 1e-12 || math.Abs(got.high-want.high) > 1e-12 {
			t.Errorf("parseStrength(%q) = %v, %v, want %v", cell, got, err, want)
		}
	}
	for _, bad := range []string{"", "1 M", "0.5 mol/L", "96 % v/v", "50 g/L", "120 %", "98-95 %", "strong"} {
		if got, err := parseStrength(bad, ""); err == nil {
			t.Errorf("parseStrength(%q) = %v, want it refused", bad, got)
		}
	}
}

// ECMA-376 part 1, 18.17.4.1: serial 45000 of the 1900 date system is 15 March 2023.
func TestParseDateCell(t *testing.T) {
	for cell, want := range map[string]Date{
		"2027-01-14": NewDate(2027, 1, 14), "2027-01": NewDate(2027, 1, 31), "14.03.2026": NewDate(2026, 3, 14), "1.2.26": NewDate(2026, 2, 1),
		"03/2027": NewDate(2027, 3, 31), "14 Mar 2026": NewDate(2026, 3, 14), "March 2026": NewDate(2026, 3, 31), "25/12/2026": NewDate(2026, 12, 25),
		"12/25/2026": NewDate(2026, 12, 25), "45000": NewDate(2023, 3, 15), "2026/3/14": NewDate(2026, 3, 14), "2026-03-14T00:00:00": NewDate(2026, 3, 14),
	} {
		if got, err := parseDateCell(cell, "", true); err != nil || got != want {
			t.Errorf("parseDateCell(%q) = %s, %v, want %s", cell, got, err, want)
		}
	}
	for _, bad := range []string{"03/04/2026", "31.02.2026", "soon", "2026-13-01", "13/13/2026"} {
		if got, err := parseDateCell(bad, "", false); err == nil {
			t.Errorf("parseDateCell(%q) = %s, want it refused", bad, got)
		}
	}
}

func TestReadTableKinds(t *testing.T) {
	book := excelize.NewFile()
	for i, row := range [][]any{{"Stock of 2026"}, {"Name", "Amount [g]", "Expiry date", "Purity"}, {"Sodium chloride", 500.5, 45000, 0.995}} {
		cell, _ := excelize.CoordinatesToCellName(1, i+1)
		if err := book.SetSheetRow("Sheet1", cell, &row); err != nil {
			t.Fatal(err)
		}
	}
	xlsx, err := book.WriteToBuffer()
	if err != nil {
		t.Fatal(err)
	}
	for name, c := range map[string]struct {
		data   string
		amount int64
	}{
		"tabs":         {"Name\tAmount [g]\tExpiry date\nSodium chloride\t500.5\t2023-03-15\n", 500500000},
		"semicolons":   {"Name;Amount in g;Expiry date\nSodium chloride;500,5;15.03.2023\n", 500500000},
		"quotes":       {"Name,\"Amount (g)\",Expiry date\n\"Sodium chloride\",\"500,5\",2023-03-15\n", 500500000},
		"mark":         {"\xef\xbb\xbfName,Amount (g),Expiry date\nSodium chloride,500.5,2023-03-15\n", 500500000},
		"utf-16":       {"\xff\xfeN\x00a\x00m\x00e\x00,\x00s\x00i\x00z\x00e\x00\n\x00N\x00a\x00C\x00l\x00,\x005\x00 \x00g\x00\n\x00", 5000000},
		"windows-1252": {"Name;Amount in g;Note\nSodium chloride;500,5;Gr\xf6\xdfe\n", 500500000},
		"xlsx":         {xlsx.String(), 500500000},
	} {
		table, err := ReadTable(name, strings.NewReader(c.data))
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		d, faults := newRowReader(table, Match(table)).read(0)
		if len(faults) > 0 || d.bottle.Size != c.amount || d.id.substance.Name != "sodium chloride" {
			t.Errorf("%s: %q, %+v", name, faults, d)
		}
		if name == "xlsx" && (d.bottle.Expiry != NewDate(2023, 3, 15) || d.form.AssayLow != .995) {
			t.Errorf("xlsx: expiry %s, strength %v", d.bottle.Expiry, d.form.AssayLow)
		}
		if name == "windows-1252" && d.bottle.Note != "Größe" {
			t.Errorf("windows-1252: note %q", d.bottle.Note)
		}
	}
	for name, data := range map[string]string{"empty.csv": "", "only.csv": "name,size\n", "x.xls": "abc", "cut.xlsx": xlsx.String()[:500], "bin.csv": "a\x00b", "quote.csv": "name,size\n\"a,b\n"} {
		if _, err := ReadTable(name, strings.NewReader(data)); !errors.Is(err, ErrInvalid) {
			t.Errorf("ReadTable(%s): %v, want ErrInvalid", name, err)
		}
	}
}

// What is exported can be taken in again: the same forms, amounts and places.
func TestExportAndImport(t *testing.T) {
	s := filled(t, openIn(t, t.TempDir()))
	ctx := context.Background()
	shelf, err := s.Load(ctx)
	if err != nil {
		t.Fatal(err)
	}
	for name, export := range map[string]func(*bytes.Buffer) error{
		"csv":  func(b *bytes.Buffer) error { return ExportCSV(b, shelf) },
		"xlsx": func(b *bytes.Buffer) error { return ExportXLSX(b, shelf) },
	} {
		var out bytes.Buffer
		if err := export(&out); err != nil {
			t.Fatal(err)
		}
		table, err := ReadTable("stock."+name, &out)
		if err != nil {
			t.Fatal(err)
		}
		again := openIn(t, t.TempDir())
		report, err := again.Import(ctx, table, Match(table), ImportOptions{Act: clerk})
		if err != nil || report.Bottles != len(shelf.Bottles) {
			t.Fatalf("%s: %d of %d bottles, %v\n%v", name, report.Bottles, len(shelf.Bottles), err, report.Refused)
		}
		back, err := again.Load(ctx)
		if err != nil {
			t.Fatal(err)
		}
		if got, want := stockLines(back), stockLines(shelf); got != want {
			t.Errorf("%s:\n%s", name, firstDifference(got, want))
		}
	}
	var out bytes.Buffer
	if err := ExportJSON(&out, shelf); err != nil || !bytes.Contains(out.Bytes(), []byte(`"density_g_mL": null`)) {
		t.Errorf("json: %v", err)
	}
}

// stockLines writes what an export carries of each bottle, sorted.
func stockLines(s *Shelf) string {
	var lines []string
	for _, b := range s.Bottles {
		form, _ := s.Form(b.FormID)
		substance, _ := s.SubstanceByID(form.SubstanceID)
		place, _ := s.Place(b.PlaceID)
		lines = append(lines, fmt.Sprint(substance.CAS, "|", form.HydrateWaters, form.AssayLow, form.AssayHigh, form.Grade, form.Measure, "|", b.Size, b.Content, place.String(), b.Lot, b.Expiry, b.Opened))
	}
	slices.Sort(lines)
	return strings.Join(lines, "\n")
}

func firstDifference(got, want string) string {
	a, b := strings.Split(got, "\n"), strings.Split(want, "\n")
	for i := range min(len(a), len(b)) {
		if a[i] != b[i] {
			return fmt.Sprintf(" got %s\nwant %s", a[i], b[i])
		}
	}
	return fmt.Sprintf("%d lines, want %d", len(a), len(b))
}
