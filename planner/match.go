package planner

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
)

// Matching: which bottles are fit for a need on the run's date, what each can
// give, and why the others are barred. What a label leaves open is taken at its
// low end, so that a need is covered even by the weakest bottle the label
// allows (practice §4).

// fit is a bottle that may be drawn on.
type fit struct {
	bottle *inventory.Bottle
	form   *inventory.StockForm
	// pure is the pure, anhydrous mass (or the pieces) in one ledger unit, as
	// the need counts it: a substitute's is divided by its factor.
	pure float64
	// content is the mass of one ledger unit in kilograms; 0 for pieces.
	content  float64
	strength chem.Fraction // of the form as named, on the day, at the low end
	top      chem.Fraction // the same at the high end
	water    chem.Fraction // of hydration and solution, of the content
	share    chem.Fraction // pure, anhydrous mass in the content
	free     int64         // ledger units
	promised int64         // to other runs
	dilute   bool          // stronger than the need allows: it has to be made up first
	blended  bool          // weaker than the need allows: only in a blend
	standsIn string        // name of the substitute; "" for the substance itself
	aged     bool          // its strength has fallen with time
	life     inventory.Date
	sealed   bool
}

// barKind is why a bottle is barred.
type barKind string

const (
	barForm     barKind = "form"
	barHydrate  barKind = "hydrate"
	barGrade    barKind = "grade"
	barAdditive barKind = "additive"
	barNoData   barKind = "no data"
	barState    barKind = "state"
	barStore    barKind = "store"
	barExpired  barKind = "expired"
	barPeroxide barKind = "peroxide test"
	barWeak     barKind = "too weak"
	barStrong   barKind = "too strong"
	barPromised barKind = "promised"
)

// matcher looks at bottles for one plan.
type matcher struct {
	shelf  *inventory.Shelf
	req    Request
	policy *policyTable
	store  int64
	claims map[int64]int64 // ledger units promised to earlier runs of a slate, by bottle
	used   map[int64]int64 // ledger units taken by needs of this plan, by bottle
	// promised lists the earmarks of other runs, by bottle.
	promised map[int64][]inventory.Earmark
	// seen keeps the matches of demands that share their substance with no
	// other, for the next pass.
	seen  map[string]*matches
	water chem.MolarMass

	// From the policy: the share of a bottle that can't be got out, the
	// peroxide limit in ppm, the room's temperature in °C, and the useless heel
	// as a share and in µL.
	unusable, peroxideLimit, roomC, heelShare, heelUL float64
}

func newMatcher(req Request, shelf *inventory.Shelf, policy *policyTable) (*matcher, error) {
	water, err := chem.ParseFormula("H2O")
	if err != nil {
		return nil, err
	}
	m := &matcher{
		shelf: shelf, req: req, policy: policy, store: homeStore(req, shelf),
		used: map[int64]int64{}, promised: map[int64][]inventory.Earmark{}, seen: map[string]*matches{},
		water: water.MolarMass(), unusable: policy.value("heel.unusable"),
		peroxideLimit: policy.value("peroxide.limit"), roomC: policy.value("room.temperature"),
		heelShare: policy.value("heel.share"), heelUL: policy.value("heel.volume") * 1e3,
	}
	for _, e := range shelf.Earmarks {
		if e.RunID == req.Run && e.RunID != 0 || slices.Contains(req.Free, e.ID) {
			continue
		}
		m.promised[e.BottleID] = append(m.promised[e.BottleID], e)
	}
	return m, nil
}

// homeStore is the store the run belongs to: the one asked for, the run's, else
// the first.
func homeStore(req Request, shelf *inventory.Shelf) int64 {
	if req.Store != 0 {
		return req.Store
	}
	if run, ok := shelf.Run(req.Run); ok && run.StoreID != 0 {
		return run.StoreID
	}
	var first int64
	for i := range shelf.Places {
		if id := shelf.Places[i].StoreID; first == 0 || id < first {
			first = id
		}
	}
	return first
}

// mostBarred bounds the barred bottles a need lists; the rest are counted.
const mostBarred = 24

// matches is what matching a demand gives.
type matches struct {
	fits     []fit // by form, then code
	weak     []fit // too weak alone, where a blend is allowed
	barred   []Barred
	more     int                 // barred and not listed
	onShelf  float64             // pure in fit bottles, before anybody's promises
	promised float64             // pure, to other runs
	barredBy map[barKind]float64 // what the barred bottles would give, as far as that can be said
}

// match looks at every bottle of the demand's substance and its substitutes.
func (m *matcher) match(d *demand) *matches {
	if found, ok := m.seen[d.key]; ok {
		return found
	}
	found := m.look(d)
	if d.alone {
		m.seen[d.key] = found
	}
	return found
}

func (m *matcher) look(d *demand) *matches {
	found := &matches{barredBy: map[barKind]float64{}}
	if d.known {
		m.matchForms(d, d.substance, Substitute{Factor: 1}, found)
	}
	for _, sub := range d.accept.Substitutes {
		if s, ok := m.shelf.Substance(sub.Substance); ok && sub.Factor > 0 {
			m.matchForms(d, s, sub, found)
		}
	}
	return found
}

func (m *matcher) matchForms(d *demand, s inventory.Substance, sub Substitute, found *matches) {
	forms := m.shelf.FormsOf(s.ID)
	for i := range forms {
		f := formMatch{matcher: m, demand: d, form: &forms[i], sub: sub}
		f.look()
		bottles := m.shelf.BottlesOf(forms[i].ID)
		if f.kind == "" {
			found.fits = slices.Grow(found.fits, len(bottles))
		}
		for k := range bottles {
			f.bottle(&bottles[k], found)
		}
	}
}

// formMatch holds what is the same for all bottles of a form.
type formMatch struct {
	*matcher
	demand *demand
	form   *inventory.StockForm
	sub    Substitute

	kind      barKind // why no bottle of the form will do; "" if they may
	why       string
	content   float64       // kilograms in a ledger unit
	anhydrous chem.Fraction // pure, anhydrous mass in the form as named
	aged      map[agedKey]chem.Fraction
}

// look finds out whether the form is fit at all.
func (f *formMatch) look() {
	f.anhydrous = 1
	if mass, ok := f.form.MassOf(1); ok {
		f.content = float64(mass)
	}
	f.kind, f.why = f.unfitForm()
}

func (f *formMatch) unfitForm() (barKind, string) {
	form, accept := f.form, f.demand.accept
	counted := form.Measure == inventory.ByCount
	switch {
	case f.demand.count != counted && counted:
		return barForm, "counted in pieces; the need is a mass"
	case f.demand.count != counted:
		return barForm, "not counted in pieces, as the need is"
	case counted:
		return "", ""
	case f.content <= 0:
		return barNoData, "density: no data, so its volume can't be turned into a mass; enter the density of the stock form"
	}
	if kind, why := f.unfitHydrate(); kind != "" {
		return kind, why
	}
	if form.Diluent != "" && !strings.EqualFold(form.Diluent, "water") {
		return barForm, "dissolved in " + form.Diluent
	}
	if form.Diluent != "" && !accept.Solution && accept.Least == 0 {
		return barForm, "a solution in water, which the recipe doesn't allow here"
	}
	if len(accept.Grades) > 0 && !slices.ContainsFunc(accept.Grades, func(g string) bool { return strings.EqualFold(g, form.Grade) }) {
		return barGrade, fmt.Sprintf("grade %q; the recipe asks for %s", firstOf(form.Grade, "not stated"), strings.Join(accept.Grades, " or "))
	}
	if form.Additive != "" && !accept.WithAdditive {
		return barAdditive, "contains " + form.Additive + ", which the recipe doesn't allow here"
	}
	return "", ""
}

// unfitHydrate also finds the share of anhydrous substance in a hydrate.
func (f *formMatch) unfitHydrate() (barKind, string) {
	waters := f.form.HydrateWaters
	if waters <= 0 {
		return "", ""
	}
	molar := f.demand.molar
	if f.sub.Substance != "" || molar <= 0 {
		molar = f.formMolar()
	}
	if molar <= 0 {
		return barNoData, "a hydrate of a substance without a formula: it can't be converted"
	}
	f.anhydrous = chem.Fraction(float64(molar) / (float64(molar) + waters*float64(f.water)))
	if !f.demand.accept.Hydrate {
		return barHydrate, fmt.Sprintf("a hydrate (%g H₂O); the recipe asks for the anhydrous substance and doesn't allow hydrates here", waters)
	}
	return "", ""
}

func (f *formMatch) formMolar() chem.MolarMass {
	s, _ := f.shelf.SubstanceByID(f.form.SubstanceID)
	formula, err := chem.ParseFormula(s.Formula)
	if err != nil {
		return unknownMolar
	}
	return formula.MolarMass()
}

// bottle decides on one bottle.
func (f *formMatch) bottle(b *inventory.Bottle, found *matches) {
	if b.State == inventory.Empty || b.State == inventory.Discarded || b.Content <= 0 {
		return
	}
	x := fit{bottle: b, form: f.form, content: f.content, life: endOf(b, f.form), sealed: b.State == inventory.Sealed}
	f.strength(&x)
	kind, why := f.kind, f.why
	if kind == "" {
		kind, why = f.unfitBottle(&x)
	}
	if kind == "" {
		kind, why = f.promises(&x)
	}
	if kind == barWeak && f.demand.accept.Solution {
		if promised, _ := f.promises(&x); promised == "" {
			found.weak = append(found.weak, x)
		}
	}
	if kind != "" {
		found.bar(b, f.form, kind, why, float64(b.Content)*x.pure)
		return
	}
	found.onShelf += float64(b.Content) * x.pure
	found.promised += float64(x.promised) * x.pure
	found.fits = append(found.fits, x)
}

func (m *matches) bar(b *inventory.Bottle, form *inventory.StockForm, kind barKind, why string, pure float64) {
	m.barredBy[kind] += pure
	if len(m.barred) >= mostBarred {
		m.more++
		return
	}
	m.barred = append(m.barred, Barred{Bottle: *b, Form: *form, Kind: string(kind), Why: why})
}

// endOf is the last day on which a bottle may be used: the earliest of its
// expiry, its shelf life from receipt and its open life from opening.
func endOf(b *inventory.Bottle, form *inventory.StockForm) inventory.Date {
	end := b.Expiry
	add := func(from inventory.Date, days int) {
		if !from.Set() || days <= 0 {
			return
		}
		if d := from.AddDays(days); !end.Set() || d < end {
			end = d
		}
	}
	if !b.Expiry.Set() {
		add(b.Received, form.ShelfLifeDays)
	}
	add(b.Opened, form.OpenLifeDays)
	return end
}

// unfitBottle looks at state, store, dates and strength.
func (f *formMatch) unfitBottle(x *fit) (barKind, string) {
	b, on := x.bottle, f.req.On
	switch b.State {
	case inventory.Quarantined:
		return barState, "quarantined" + noted(b)
	case inventory.Missing:
		return barState, "missing" + noted(b)
	case inventory.OnLoan:
		return barState, "on loan" + noted(b)
	}
	if b.StoreID != 0 && f.store != 0 && b.StoreID != f.store && !slices.Contains(f.req.Leave, b.StoreID) {
		return barStore, "in another store, from which there is no leave to take it"
	}
	if x.life.Set() && x.life < on {
		return barExpired, f.expired(b, x.life)
	}
	if kind, why := f.peroxide(b); kind != "" {
		return kind, why
	}
	return f.unfitStrength(x)
}

func noted(b *inventory.Bottle) string {
	if b.Note == "" {
		return ""
	}
	return ": " + b.Note
}

func (f *formMatch) expired(b *inventory.Bottle, life inventory.Date) string {
	if b.Expiry == life {
		return fmt.Sprintf("expires %s, before the run on %s", life.Short(), f.req.On.Short())
	}
	if b.Opened.Set() && f.form.OpenLifeDays > 0 && b.Opened.AddDays(f.form.OpenLifeDays) == life {
		return fmt.Sprintf("opened %s and good for %d days after that, so until %s, before the run", b.Opened.Short(), f.form.OpenLifeDays, life.Short())
	}
	return fmt.Sprintf("received %s and good for %d days, so until %s, before the run", b.Received.Short(), f.form.ShelfLifeDays, life.Short())
}

// peroxide bars an opened peroxide former whose test is overdue on the run's
// date, and any bottle that has failed one.
func (f *formMatch) peroxide(b *inventory.Bottle) (barKind, string) {
	if b.PeroxidePPM > 0 && b.PeroxidePPM >= f.peroxideLimit {
		return barPeroxide, fmt.Sprintf("%g ppm of peroxide in the last test; the limit is %g ppm. Do not open or move it; ask the safety officer", b.PeroxidePPM, f.peroxideLimit)
	}
	if f.form.PeroxideTestDays <= 0 || !b.Opened.Set() {
		return "", ""
	}
	last, done := b.PeroxideTested, "tested"
	if !last.Set() {
		last, done = b.Opened, "opened"
	}
	due := last.AddDays(f.form.PeroxideTestDays)
	if due >= f.req.On {
		return "", ""
	}
	return barPeroxide, fmt.Sprintf("peroxide test overdue: %s %s, due by %s", done, last.Short(), due.Short())
}

// promises takes off what other runs were promised and what can't be got out.
func (f *formMatch) promises(x *fit) (barKind, string) {
	b := x.bottle
	earmarks := f.promised[b.ID]
	for i := range earmarks {
		x.promised += earmarks[i].Amount
	}
	x.promised += f.claims[b.ID]
	x.promised = min(x.promised, b.Content)
	dead := int64(0)
	if f.form.Measure != inventory.ByCount {
		dead = int64(f.unusable * float64(b.Size))
	}
	x.free = b.Content - x.promised - f.used[b.ID] - dead
	if x.free > 0 {
		return "", ""
	}
	if x.promised == 0 {
		return barState, "nothing left that can be got out"
	}
	return barPromised, f.promisedTo(earmarks)
}

// promisedTo names the first run a bottle is promised to.
func (f *formMatch) promisedTo(earmarks []inventory.Earmark) string {
	if len(earmarks) == 0 {
		return "promised to an earlier run of the slate"
	}
	e := earmarks[0]
	why := fmt.Sprintf("promised to run %d", e.RunID)
	if e.Owner != "" {
		why += " (" + e.Owner + ")"
	}
	if e.ForDate.Set() {
		why += " on " + e.ForDate.Short()
	}
	if e.Ends.Set() && e.Ends < f.req.Today {
		why += "; the promise lapsed on " + e.Ends.Short() + " and can be freed"
	}
	return why
}
