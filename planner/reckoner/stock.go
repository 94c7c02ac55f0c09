package reckoner

import (
	"context"
	"errors"
	"fmt"
	"math"
	"strconv"
	"strings"

	"stillroom/chem"
	"stillroom/planner"
)

// stockSums are the sums on stock and buying.
func stockSums() []Sum { return []Sum{packsSum()} }

func packsSum() Sum {
	return Sum{
		Name: "packs", Title: "Cheapest packs", Group: "Stock",
		About: "Which packs cover a need for the least money.",
		Keys: []Key{
			{Name: "need", Label: "Need", Hint: "2600 mL"},
			{Name: "offers", Label: "Offers, size@price", Hint: "100 mL@12; 500 mL@38; 1 L@65; 2.5 L@130"},
		},
		Gives:   []string{"cost", "one row for each pack taken"},
		Example: []string{"need=2600 mL", "offers=100 mL@12; 500 mL@38; 1 L@65; 2.5 L@130"},
		Range:   "needs up to four million times the packs' common step; all prices in one currency, fees left out",
		Source:  "minimum-cost covering by a table over amounts: S. Martello and P. Toth, Knapsack Problems, Wiley 1990",
		Run:     packs,
	}
}

func packs(_ context.Context, args Args) (Answer, error) {
	kind, need, err := readSize(args, "need", args["need"])
	if err != nil {
		return Answer{}, err
	}
	list, err := args.List("offers")
	if err != nil {
		return Answer{}, err
	}
	offers, decimals, err := readOffers(args, kind, list)
	if err != nil {
		return Answer{}, err
	}
	order, err := planner.CheapestPacks([]planner.PackNeed{{Amount: need, Offers: offers}})
	if err != nil && !errors.Is(err, planner.ErrPacksNotProven) {
		return Answer{}, &KeyError{Key: "offers", Text: args["offers"], Cause: err}
	}
	answer := packsAnswer(order, offers, decimals)
	if err != nil {
		answer.Notes = append(answer.Notes, "too many ways to try them all: a cheaper choice may exist")
	}
	answer.Notes = append(answer.Notes, fmt.Sprintf("%s left over", sizeText(kind, order.Left[0])))
	answer.Derivation.Inserted = packsInserted(order, offers, decimals)
	return answer, nil
}

func packsAnswer(order planner.PackOrder, offers []planner.PackOffer, decimals int) Answer {
	cost := float64(order.Cost) / math.Pow10(decimals)
	answer := Answer{Sum: "packs", Results: []Result{{Name: "cost", Value: cost}}}
	for _, c := range order.Choices[0] {
		answer.Results = append(answer.Results, Result{Name: offers[c.Offer].Name, Value: float64(c.Packs), Unit: "packs"})
	}
	answer.Derivation = chem.Derivation{
		Of: "cost", Formula: "least Σ cⱼ·xⱼ with Σ sⱼ·xⱼ ≥ need, xⱼ whole", Value: cost,
		Source: "minimum-cost covering by a table over amounts (Martello and Toth, Knapsack Problems, 1990)",
	}
	return answer
}

func packsInserted(order planner.PackOrder, offers []planner.PackOffer, decimals int) string {
	var parts []string
	for _, c := range order.Choices[0] {
		parts = append(parts, fmt.Sprintf("%d · %g", c.Packs, float64(offers[c.Offer].Price)/math.Pow10(decimals)))
	}
	return fmt.Sprintf("%s = %g", strings.Join(parts, " + "), float64(order.Cost)/math.Pow10(decimals))
}

// sizeKind is what packs are counted in.
type sizeKind int

const (
	byMass sizeKind = iota
	byVolume
	byCount
)

// readSize reads a mass, a volume or a number.
func readSize(args Args, key, text string) (sizeKind, float64, error) {
	if strings.TrimSpace(text) == "" {
		return 0, 0, missing(key, "2600 mL")
	}
	m, err := chem.ParseMass(text)
	switch {
	case err == nil:
		return byMass, float64(m), positiveSize(key, text, float64(m))
	case errors.Is(err, chem.ErrAmbiguous):
		return 0, 0, &KeyError{Key: key, Text: text, Cause: err}
	}
	if n, err := chem.ParseNumber(text); err == nil {
		return byCount, n, positiveSize(key, text, n)
	}
	v, err := chem.ParseVolume(text)
	if err != nil {
		return 0, 0, &KeyError{Key: key, Text: text, What: "not a mass, a volume or a number", Wanted: `write "2600 mL", "1.2 kg" or "150"`, Cause: err}
	}
	// Volumes are counted in litres, so that a microlitre isn't lost in the
	// billionths of the unit that packs are counted in.
	return byVolume, float64(v / chem.Litre), positiveSize(key, text, float64(v))
}

func positiveSize(key, text string, x float64) error {
	if x > 0 {
		return nil
	}
	return &KeyError{Key: key, Text: text, What: "not above nought", Wanted: "give an amount above nought", Cause: chem.ErrOutOfRange}
}

func sizeText(kind sizeKind, x float64) string {
	switch kind {
	case byMass:
		return fmt.Sprintf("%.6g g", x*1e3)
	case byVolume:
		return fmt.Sprintf("%.6g mL", x*1e3)
	}
	return fmt.Sprintf("%.6g", x)
}

// mostDecimals bounds the decimal places of a price.
const mostDecimals = 6

// readOffers reads "size@price; …". Prices become whole numbers with as many
// decimal places as the finest has.
func readOffers(args Args, kind sizeKind, list []string) ([]planner.PackOffer, int, error) {
	var offers []planner.PackOffer
	var prices []string
	decimals := 0
	for _, item := range list {
		size, price, ok := strings.Cut(item, "@")
		size, price = strings.TrimSpace(size), strings.TrimSpace(price)
		if !ok || price == "" {
			return nil, 0, &KeyError{Key: "offers", Text: item, What: "no price", Wanted: "write size@price, such as 500 mL@38", Cause: chem.ErrSyntax}
		}
		k, amount, err := readSize(args, "offers", size)
		if err != nil {
			return nil, 0, err
		}
		if k != kind {
			return nil, 0, &KeyError{Key: "offers", Text: item, What: "not of the same kind as the need", Wanted: "give need and packs all as masses, all as volumes or all as numbers", Cause: chem.ErrUnknownUnit}
		}
		if _, after, point := strings.Cut(strings.ReplaceAll(price, ",", "."), "."); point {
			decimals = max(decimals, len(after))
		}
		prices = append(prices, price)
		offers = append(offers, planner.PackOffer{Name: size, Size: amount})
	}
	for i, price := range prices {
		minor, err := readPrice(price, decimals)
		if err != nil {
			return nil, 0, err
		}
		offers[i].Price = minor
	}
	return offers, decimals, nil
}

func readPrice(price string, decimals int) (int64, error) {
	x, err := chem.ParseNumber(price)
	if err != nil || x < 0 || decimals > mostDecimals || x > 1e9 {
		return 0, &KeyError{Key: "offers", Text: price, What: "not a price", Wanted: "write a number of 0 or more with at most " + strconv.Itoa(mostDecimals) + " decimal places, without its currency", Cause: firstError(err, chem.ErrOutOfRange)}
	}
	return int64(math.Round(x * math.Pow10(decimals))), nil
}

func firstError(errs ...error) error {
	for _, err := range errs {
		if err != nil {
			return err
		}
	}
	return nil
}
