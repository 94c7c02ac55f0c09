package views

import (
	"errors"
	"fmt"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// ErrNothingShort says that a plan needs no requisition.
var ErrNothingShort = errors.New("nothing is short")

// Requisition prints what to buy for a run: each shortfall with its arithmetic
// and specification, the pack chosen, dates and cost, the rules that bear on the
// purchase, and room for what only people know. A shortfall nobody offers is
// printed too. If nothing is short the error is ErrNothingShort.
func Requisition(p *planner.Plan, o PaperOptions) ([]byte, error) {
	s, err := newSheet(p, o, "Requisition")
	if err != nil {
		return nil, err
	}
	r := &requisition{s}
	short := needsShort(p)
	if len(short) == 0 && len(p.Buy) == 0 {
		return nil, fmt.Errorf("requisition for %s of %s: %w", massPlain(p.Target.Mass), p.Target.Substance, ErrNothingShort)
	}
	r.total()
	bought := map[string]bool{}
	for _, b := range p.Buy {
		bought[b.Substance] = true
		r.purchase(b, needOf(p, b.Substance))
	}
	for _, n := range short {
		if !bought[n.Substance] {
			r.noOffer(n)
		}
	}
	r.approval()
	return s.finish()
}

type requisition struct{ *sheet }

func needsShort(p *planner.Plan) []planner.Need {
	var short []planner.Need
	for _, n := range p.Needs {
		if n.Short > 0 || n.ShortPieces > 0 {
			short = append(short, n)
		}
	}
	return short
}

func needOf(p *planner.Plan, substance string) planner.Need {
	for _, n := range p.Needs {
		if n.Substance == substance {
			return n
		}
	}
	return planner.Need{Substance: substance}
}

// total sums the cost by currency.
func (r *requisition) total() {
	r.heading("Total", 10)
	var currencies []string
	sums := map[string]int64{}
	for _, b := range r.plan.Buy {
		if _, ok := sums[b.Currency]; !ok {
			currencies = append(currencies, b.Currency)
		}
		sums[b.Currency] += b.Cost
	}
	var words []string
	for _, c := range currencies {
		words = append(words, moneyText(sums[c], c))
	}
	cost := strings.Join(words, " + ") + ", with order fees and surcharges; tax not included"
	if len(words) == 0 {
		cost = "no offer on record"
	}
	r.labelled("Cost", cost)
	r.labelled("For", fmt.Sprintf("%s of %s on %s", massPlain(r.plan.Target.Mass), r.plan.Target.Substance, r.plan.On.Long()))
	r.labelled("Requested by", orBlank(r.options.PrintedBy))
}

func orBlank(s string) string {
	if s == "" {
		return "____________________"
	}
	return s
}

func (r *requisition) purchase(b planner.Purchase, n planner.Need) {
	r.heading(b.Substance, 70)
	r.tick(marginLeft, r.y)
	r.putRight(family, "B", amountSize, r.right, r.y-0.8, fmt.Sprintf("%d × %s", b.Packs, packSize(b.Offer, b.Form)))
	r.put(family, "B", nameSize, textLeft, r.y, b.Form.Name)
	r.y += tickSide + 2
	r.labelled("Substance", specification(n, b.Form))
	r.labelled("Why", shortArithmetic(n))
	r.labelled("Offer", fmt.Sprintf("%s, item %s; %s with fees; %s", b.Offer.Supplier, orDash(b.Offer.Item), moneyText(b.Cost, b.Currency), b.Why))
	r.labelled("Order by", orderText(b))
	r.labelled("Left over", leftOver(b))
	r.labelled("Store", storeText(b.Form))
	r.rules(n.Substance, b.Form)
	r.people()
}

func orDash(s string) string {
	if s == "" {
		return "–"
	}
	return s
}

// specification is what a buyer must not get wrong.
func specification(n planner.Need, f inventory.StockForm) string {
	words := []string{n.Substance}
	if n.CAS != "" {
		words = append(words, "CAS "+n.CAS)
	} else {
		words = append(words, "CAS no data")
	}
	if f.HydrateWaters > 0 {
		words = append(words, figures(f.HydrateWaters, 2)+" waters of hydration")
	} else if n.Formula != "" {
		words = append(words, "anhydrous")
	}
	if f.AssayLow > 0 {
		words = append(words, "at least "+percentText(chem.Fraction(f.AssayLow)))
	}
	if f.Grade != "" {
		words = append(words, "grade "+f.Grade)
	}
	if f.Additive != "" {
		words = append(words, "stabilised with "+f.Additive)
	} else {
		words = append(words, "no stabiliser")
	}
	return strings.Join(words, "; ")
}

// shortArithmetic shows need less usable stock.
func shortArithmetic(n planner.Need) string {
	if n.Count {
		return piecesText(n.Pieces) + " needed, " + piecesText(n.ShortPieces) + " short"
	}
	if n.Mass <= 0 {
		return "need not in the plan: not assessed"
	}
	text := fmt.Sprintf("needs %s, %s of it is covered, short by %s (pure substance)", massText(n.Mass), massText(n.Mass-n.Short), massText(n.Short))
	if len(n.For) > 0 {
		text += "; for " + strings.Join(n.For, ", ")
	}
	if n.Because != "" {
		text += "; " + n.Because
	}
	return text
}

func orderText(b planner.Purchase) string {
	text := "no date: lead time not on record"
	if b.OrderBy.Set() {
		text = b.OrderBy.Long()
	}
	if b.Arrives.Set() {
		text += "; ordered today it is here by " + dateText(b.Arrives) + " nine times in ten"
	}
	if !b.InTime {
		text += "; TOO LATE for this run"
	}
	return text
}

func leftOver(b planner.Purchase) string {
	if b.Leftover <= 0 {
		return "nothing"
	}
	text := massText(b.Leftover) + "; plan for it:"
	return text + " ____________________"
}

func storeText(f inventory.StockForm) string {
	if f.StorageClass == "" {
		return "storage class no data; room checked on the day: ____________________"
	}
	return f.StorageClass + "; room checked on the day: ____________________"
}

// rules lists what may bear on the purchase.
func (r *requisition) rules(name string, f inventory.StockForm) {
	notes := chem.PurchaseNotes(name, f.Assay())
	if len(notes) == 0 {
		r.labelled("Rules", "none on record for this substance; that is not evidence that there is none")
		return
	}
	label := "Rules"
	for _, n := range notes {
		r.labelled(label, fmt.Sprintf("%s, %s (%s): %s; %s", n.Jurisdiction, n.Instrument, n.Entry, n.Meaning, n.Defer))
		label = ""
	}
}

// people has the blanks that only people can fill.
func (r *requisition) people() {
	r.y += 1.5
	for _, row := range [][2]string{{"less hazardous substance considered", "smallest pack that serves"}, {"other stores asked", "supplier's sheet on file"}} {
		r.room(9)
		half := (r.right - textLeft) / 2
		r.blank(textLeft, r.y, half-r.measure(family, "", textSize, row[0])-5, row[0])
		r.blank(textLeft+half, r.y, half-r.measure(family, "", textSize, row[1])-1.5, row[1])
		r.y += 9
	}
}

// noOffer is a shortfall that no offer on record answers.
func (r *requisition) noOffer(n planner.Need) {
	r.heading(n.Substance, 30)
	r.labelled("Why", shortArithmetic(n))
	r.labelled("Offer", "no offer on record: ask for one, or weigh, borrow, replace, shrink or move the run")
	r.rules(n.Substance, inventory.StockForm{})
	r.people()
}

func (r *requisition) approval() {
	r.heading("Approval", 45)
	for _, row := range [][2]string{{"responsible person", "delivery room and department"}, {"charge code", "needed by"}, {"approved by", "date"}} {
		r.room(9)
		half := (r.right - marginLeft) / 2
		r.blank(marginLeft, r.y, half-r.measure(family, "", textSize, row[0])-5, row[0])
		r.blank(marginLeft+half, r.y, half-r.measure(family, "", textSize, row[1])-1.5, row[1])
		r.y += 9
	}
}
