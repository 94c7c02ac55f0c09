package inventory

import (
	"context"
	"fmt"
	"slices"
	"strings"

	"gorm.io/gorm"
)

// importer takes drafts into stock inside one transaction.
type importer struct {
	store   *Store
	tx      *gorm.DB
	options ImportOptions
	report  *ImportReport
	table   Table
	mapping Mapping
	id      int64
	marks   map[string]string // own numbers that are on bottles already → code

	byName, byCAS map[string]Substance
	forms         map[formKey]StockForm
	formNames     map[string]bool
	places        map[Place]Place // by words
	stores        map[string]int64
	firstStore    string
	walk          int
	peroxideDays  int
}

// formKey is what tells the forms of a substance apart.
type formKey struct {
	substance                int64
	waters, low, high        float64
	diluent, grade, additive string
	measure                  Measure
}

func keyOf(f StockForm) formKey {
	return formKey{f.SubstanceID, f.HydrateWaters, f.AssayLow, f.AssayHigh, f.Diluent, f.Grade, f.Additive, f.Measure}
}

func (in *importer) run(ctx context.Context) error {
	print := in.table.fingerprint()
	if err := in.refuseAgain(print); err != nil {
		return err
	}
	if err := in.loadKnown(); err != nil {
		return err
	}
	if err := in.loadMarks(); err != nil {
		return err
	}
	var err error
	if in.id, err = in.store.nextID(in.tx, "imports"); err != nil {
		return err
	}
	err = in.store.withoutIndexes(in.tx, len(in.table.Rows), func() error { return in.bottles(ctx) })
	if err != nil {
		return err
	}
	in.report.Import = in.id
	row := StockImport{ID: in.id, At: in.store.stamp(), ByWhom: in.options.Act.By, Name: in.table.Name, Fingerprint: print,
		RowsRead: in.report.Rows, Taken: in.report.Taken, Bottles: in.report.Bottles}
	return in.tx.Create(&row).Error
}

func (in *importer) refuseAgain(print string) error {
	var earlier []StockImport
	if err := in.tx.Where("fingerprint = ? AND undone IS NULL", print).Limit(1).Find(&earlier).Error; err != nil || len(earlier) == 0 {
		return err
	}
	return &Error{Doing: "import", What: in.table.Name, Kind: ErrDuplicate,
		Why:   fmt.Sprintf("the same list was taken in on %s as import %d", earlier[0].At.Format("2 Jan 2006"), earlier[0].ID),
		Would: "undo that import first"}
}

func (in *importer) loadKnown() error {
	var substances []Substance
	var forms []StockForm
	var places []Place
	var stores []storeroom
	var policy []PolicyRow
	for _, err := range []error{in.tx.Find(&substances).Error, in.tx.Find(&forms).Error, in.tx.Find(&places).Error,
		in.tx.Order("id").Find(&stores).Error, in.tx.Where("key = ?", "peroxide.test-days").Find(&policy).Error} {
		if err != nil {
			return err
		}
	}
	in.byName, in.byCAS = map[string]Substance{}, map[string]Substance{}
	for _, s := range substances {
		in.know(s)
	}
	in.forms, in.formNames = map[formKey]StockForm{}, map[string]bool{}
	for _, f := range forms {
		in.forms[keyOf(f)], in.formNames[f.Name] = f, true
	}
	in.stores = map[string]int64{}
	for _, s := range stores {
		in.stores[s.Name] = s.ID
	}
	in.firstStore = in.options.Store
	if in.firstStore == "" {
		in.firstStore = "Main store"
		if len(stores) > 0 {
			in.firstStore = stores[0].Name
		}
	}
	in.places = map[Place]Place{}
	for _, p := range places {
		in.places[placeWords(p)] = p
		in.walk = max(in.walk, p.Walk)
	}
	for _, row := range policy {
		in.peroxideDays = int(row.Value)
	}
	return nil
}

func (in *importer) know(s Substance) {
	in.byName[nameKey(s.Name)] = s
	if s.CAS != "" {
		in.byCAS[s.CAS] = s
	}
}

func placeWords(p Place) Place {
	return Place{Store: p.Store, Room: p.Room, Cabinet: p.Cabinet, Shelf: p.Shelf}
}

// loadMarks finds the own numbers of the list that are on bottles already.
func (in *importer) loadMarks() error {
	in.marks = map[string]string{}
	column, ok := in.mapping.Columns[FieldMark]
	if !ok {
		return nil
	}
	spelling := in.store.plainColumn("mark") // the index is over this spelling
	for part := range slices.Chunk(in.table.Rows, 5000) {
		plain := make([]string, 0, len(part))
		for _, row := range part {
			if column < len(row) && strings.TrimSpace(row[column]) != "" {
				plain = append(plain, spelledPlain(strings.TrimSpace(row[column])))
			}
		}
		var there []Bottle
		if err := in.tx.Select("code", "mark").Where("mark <> '' AND "+spelling+" IN ? AND state <> ?", plain, Discarded).Find(&there).Error; err != nil {
			return err
		}
		for _, b := range there {
			in.marks[b.Mark] = b.Code
		}
	}
	return nil
}

// substance finds the substance of a draft in stock or adds it.
func (in *importer) substance(d *draft) (Substance, error) {
	want := d.id.substance
	if want.CAS != "" {
		if s, ok := in.byCAS[want.CAS]; ok {
			return s, nil
		}
	}
	if s, ok := in.byName[nameKey(want.Name)]; ok {
		return s, nil
	}
	if err := in.tx.Create(&want).Error; err != nil {
		return want, err
	}
	in.know(want)
	in.report.NewSubstances = append(in.report.NewSubstances, want.Name)
	if want.Own {
		in.report.NoData = append(in.report.NoData, want.Name+": not in the embedded table; formula, hazards and properties: no data")
	} else {
		in.report.Filled = append(in.report.Filled, fmt.Sprintf("%s: CAS %s, formula %s, from the %s", want.Name, orNoData(want.CAS), orNoData(want.Formula), want.Source))
	}
	return want, nil
}

func orNoData(s string) string {
	if s == "" {
		return "no data"
	}
	return s
}

// form finds the form of a draft in stock or adds it.
func (in *importer) form(d *draft) (StockForm, error) {
	s, err := in.substance(d)
	if err != nil {
		return StockForm{}, err
	}
	f := d.form
	f.SubstanceID = s.ID
	if f.PeroxideTestDays < 0 {
		f.PeroxideTestDays = in.peroxideDays
	}
	if known, ok := in.forms[keyOf(f)]; ok {
		return known, nil
	}
	name := f.Name
	for n := 2; in.formNames[f.Name]; n++ {
		f.Name = fmt.Sprintf("%s (%d)", name, n)
	}
	if err := in.tx.Create(&f).Error; err != nil {
		return f, err
	}
	in.forms[keyOf(f)], in.formNames[f.Name] = f, true
	in.report.NewForms = append(in.report.NewForms, f.Name)
	in.noteForm(f)
	return f, nil
}

func (in *importer) noteForm(f StockForm) {
	var missing []string
	if f.AssayHigh == 0 && f.Measure != ByCount {
		missing = append(missing, "strength")
	}
	if f.DensityGML > 0 {
		in.report.Filled = append(in.report.Filled, fmt.Sprintf("%s: density %.4g g/mL, from the %s", f.Name, f.DensityGML, f.DensitySource))
	} else if f.Measure == ByVolume {
		missing = append(missing, "density")
	}
	if len(missing) > 0 {
		in.report.NoData = append(in.report.NoData, f.Name+": "+strings.Join(missing, " and ")+": no data")
	}
}

// place finds the place of a draft in stock or adds it at the end of the walk.
func (in *importer) place(d *draft) (Place, error) {
	p := d.place
	if p.Store == "" {
		p.Store = in.firstStore
	}
	if p.Room == "" && p.Cabinet == "" && p.Shelf == "" {
		p.Cabinet = "not placed yet"
	}
	words := placeWords(p)
	if known, ok := in.places[words]; ok {
		return known, nil
	}
	if known, ok := in.placeLike(p); ok {
		in.places[words] = known
		return known, nil
	}
	store, ok := in.stores[p.Store]
	if !ok {
		row := storeroom{Name: p.Store}
		if err := in.tx.Create(&row).Error; err != nil {
			return p, err
		}
		store = row.ID
		in.stores[p.Store] = store
	}
	in.walk += 10
	p.StoreID, p.Walk = store, in.walk
	if err := in.tx.Create(&p).Error; err != nil {
		return p, err
	}
	in.places[words] = p
	in.report.NewPlaces = append(in.report.NewPlaces, p.String())
	return p, nil
}

// placeLike finds the one place that has all the words a list gives, as when
// the list leaves out the room.
func (in *importer) placeLike(p Place) (found Place, ok bool) {
	for _, known := range in.places {
		if fits(p.Store, known.Store) && fits(p.Room, known.Room) && fits(p.Cabinet, known.Cabinet) && fits(p.Shelf, known.Shelf) {
			if ok && known.ID != found.ID {
				return Place{}, false
			}
			found, ok = known, true
		}
	}
	return found, ok
}

func fits(said, known string) bool { return said == "" || strings.EqualFold(said, known) }
