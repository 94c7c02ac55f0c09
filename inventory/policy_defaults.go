package inventory

// PolicyDefaults returns the rows a new store starts with, set by nobody on the
// day given. Shares and chances are fractions of one (unit "1"). Where the
// source says "common practice", no law or page stands behind the number: it
// is there to be replaced by the site's own.
func PolicyDefaults(today Date) []PolicyRow {
	var all []PolicyRow
	for _, group := range [][]PolicyRow{
		riskDefaults(), fillDefaults(), stockDefaults(), reviewDefaults(),
		yieldPriors(), contentPriors(), lossPriors(), heatDefaults(), allocateDefaults(), dayDefaults(),
	} {
		all = append(all, group...)
	}
	for i := range all {
		all[i].SetBy, all[i].SetOn = "as delivered", today
	}
	return all
}

const commonPractice = "common practice"

func riskDefaults() []PolicyRow {
	return []PolicyRow{
		{Key: "risk.limit", Value: 0.05, Unit: "1", Meaning: "chance of running short above which a covered need is tight", Source: commonPractice},
		{Key: "risk.certainty", Value: 0.90, Unit: "1", Meaning: "certainty with which the target mass is to be met; the yield percentile the run is scaled on", Source: commonPractice},
		{Key: "risk.draws", Value: 10000, Unit: "1", Meaning: "random draws for the chance of running short", Source: commonPractice},
		{Key: "risk.seed", Value: 1851, Unit: "1", Meaning: "seed of the random draws, so that a plan can be repeated", Source: "chosen once; any number does"},
		{Key: "earmark.days", Value: 14, Unit: "d", Meaning: "an earmark lapses this long after the run's date unless it is reconfirmed", Source: commonPractice},
		{Key: "slate.horizon", Value: 90, Unit: "d", Meaning: "how far ahead the slate looks for a date on which a run is covered", Source: commonPractice},
	}
}

func fillDefaults() []PolicyRow {
	return []PolicyRow{
		{Key: "fill.round-flask", Value: 2.0 / 3, Unit: "1", Meaning: "fill limit of a flask in which something reacts or boils", Source: "a still pot half to two-thirds full: CU Boulder organic laboratories, distillation, read as a stored copy"},
		{Key: "fill.still", Value: 2.0 / 3, Unit: "1", Meaning: "fill limit of a still pot", Source: "half to two-thirds full: CU Boulder organic laboratories, distillation, read as a stored copy"},
		{Key: "fill.evaporator", Value: 0.5, Unit: "1", Meaning: "fill limit of a flask on the rotary evaporator", Source: commonPractice},
		{Key: "fill.separating-funnel", Value: 0.75, Unit: "1", Meaning: "fill limit of a separating funnel that is shaken", Source: commonPractice},
		{Key: "fill.beaker", Value: 0.75, Unit: "1", Meaning: "fill limit of a beaker that is stirred", Source: commonPractice},
		{Key: "fill.conical-flask", Value: 0.75, Unit: "1", Meaning: "fill limit of a conical flask", Source: commonPractice},
		{Key: "fill.dropping-funnel", Value: 0.9, Unit: "1", Meaning: "fill limit of a dropping funnel", Source: commonPractice},
		{Key: "fill.bottle", Value: 0.9, Unit: "1", Meaning: "fill limit of a bottle something is put into", Source: commonPractice},
		{Key: "fill.waste", Value: 0.75, Unit: "1", Meaning: "fill limit of a waste carboy; others leave 10 % headspace", Source: "Univ. Washington EHS 2017 and New Mexico State 2007, read as stored copies"},
		{Key: "still.leave", Value: 0.10, Unit: "1", Meaning: "share of the liquid that stays in the pot of a distillation", Source: "Virginia Tech EHS, peroxide formers, read as a stored copy"},
	}
}

func stockDefaults() []PolicyRow {
	return []PolicyRow{
		{Key: "peroxide.test-days", Value: 180, Unit: "d", Meaning: "longest time since opening or the last test of a peroxide former", Source: "6 months: Virginia Tech EHS and Iowa State EHS, read as stored copies; other rules say 3 or 12"},
		{Key: "peroxide.limit", Value: 100, Unit: "ppm", Meaning: "peroxide content from which a bottle is barred and discarded", Source: "Iowa State EHS, read as a stored copy"},
		{Key: "peroxide.distil-limit", Value: 20, Unit: "ppm", Meaning: "peroxide content above which nothing is distilled or boiled down", Source: commonPractice},
		{Key: "peroxide.unopened-days", Value: 365, Unit: "d", Meaning: "unopened ether without inhibitor: discard or test", Source: "Virginia Tech EHS, read as a stored copy"},
		{Key: "heel.share", Value: 0.05, Unit: "1", Meaning: "a heel below this share of the bottle is useless", Source: commonPractice},
		{Key: "heel.volume", Value: 50, Unit: "mL", Meaning: "a heel below this volume is useless", Source: commonPractice},
		{Key: "heel.unusable", Value: 0.005, Unit: "1", Meaning: "share of the bottle that can't be poured or scraped out", Source: commonPractice},
		{Key: "stocktake.promised-days", Value: 14, Unit: "d", Meaning: "bottles promised within this time come first in a stock-take", Source: commonPractice},
		{Key: "stocktake.lapsing-days", Value: 30, Unit: "d", Meaning: "a bottle that expires within this time is looked at", Source: commonPractice},
		{Key: "stocktake.unseen-days", Value: 365, Unit: "d", Meaning: "a bottle unseen for this long is counted", Source: "yearly count: Prudent Practices 2011, p. 92"},
		{Key: "stocktake.list", Value: 12, Unit: "1", Meaning: "bottles on the daily short list", Source: commonPractice},
		{Key: "label.small", Value: 125, Unit: "mL", Meaning: "largest content of a bottle whose label may leave out statements for want of room", Source: "Reg. (EC) 1272/2008 Annex I 1.5.2, from memory; 29 CFR 1910.1200(f)(12) says 100 mL"},
		{Key: "carrier.mass", Value: 10, Unit: "kg", Meaning: "most mass in one carrier", Source: commonPractice},
		{Key: "carrier.count", Value: 6, Unit: "1", Meaning: "most bottles in one carrier", Source: commonPractice},
		{Key: "buy.receiving-days", Value: 1, Unit: "d", Meaning: "days from the delivery door to the shelf", Source: commonPractice},
		{Key: "buy.hazard-days", Value: 2, Unit: "d", Meaning: "extra days for hazardous goods; 1 to 10 are seen", Source: commonPractice},
		{Key: "room.temperature", Value: 20, Unit: "Cel", Meaning: "temperature of the room and of the store", Source: commonPractice},
		{Key: "room.cold-store", Value: 4, Unit: "Cel", Meaning: "temperature of the refrigerator", Source: commonPractice},
		{Key: "room.pressure", Value: 101.325, Unit: "kPa", Meaning: "air pressure at the bench", Source: "standard atmosphere, 10th CGPM 1954"},
	}
}

func reviewDefaults() []PolicyRow {
	return []PolicyRow{
		{Key: "scale.warn", Value: 3, Unit: "1", Meaning: "scale beyond the proven one from which the plan warns", Source: "Univ. Illinois DRS, scale-up safety, read as a stored copy"},
		{Key: "scale.large-substrate", Value: 15, Unit: "g", Meaning: "substrate from which a run counts as large", Source: "Univ. Illinois DRS, scale-up safety, read as a stored copy"},
		{Key: "scale.large-solvent", Value: 500, Unit: "mL", Meaning: "solvent from which a run counts as large", Source: "Univ. Illinois DRS, scale-up safety, read as a stored copy"},
		{Key: "review.heat-margin", Value: 1.5, Unit: "1", Meaning: "cooling available over heat released below which a review is needed", Source: commonPractice},
		{Key: "review.gas", Value: 5, Unit: "L", Meaning: "gas evolved above which a review is needed", Source: commonPractice},
		{Key: "review.months", Value: 12, Unit: "mo", Meaning: "age of an approval after which a review is needed", Source: commonPractice},
	}
}

func yieldPriors() []PolicyRow {
	return []PolicyRow{
		{Key: "prior.yield.sd-own", Value: 0.045, Unit: "1", Meaning: "spread of the yield of an own recipe with three runs or more (3 to 6 points)", Source: commonPractice},
		{Key: "prior.yield.sd-checked", Value: 0.035, Unit: "1", Meaning: "spread of the yield of an independently checked procedure", Source: "interview with an Organic Syntheses editor, 2013, read as a stored copy"},
		{Key: "prior.yield.sd-unchecked", Value: 0.09, Unit: "1", Meaning: "spread of the yield of an unchecked procedure (8 to 10 points)", Source: commonPractice},
		{Key: "prior.yield.shift-unchecked", Value: -0.05, Unit: "1", Meaning: "mean of the yield of an unchecked procedure against the stated one", Source: commonPractice},
		{Key: "prior.yield.shift-scale", Value: -0.065, Unit: "1", Meaning: "further shift at a first scale-up beyond the warning (3 to 10 points)", Source: commonPractice},
		{Key: "prior.yield.cap", Value: 0.95, Unit: "1", Meaning: "isolated yield above which a prior isn't believed", Source: "Wernerova & Hudlicky, Synlett 2010, 2701 (abstract)"},
		{Key: "prior.yield.weight", Value: 3, Unit: "1", Meaning: "how many own runs the prior counts for", Source: commonPractice},
	}
}

func contentPriors() []PolicyRow {
	return []PolicyRow{
		{Key: "prior.content.unopened-low", Value: -0.01, Unit: "1", Meaning: "least content of an unopened bottle against its label", Source: commonPractice},
		{Key: "prior.content.unopened-high", Value: 0.02, Unit: "1", Meaning: "most content of an unopened bottle against its label", Source: commonPractice},
		{Key: "prior.content.weighed", Value: 0.01, Unit: "1", Meaning: "spread of a weighed content, of the content", Source: commonPractice},
		{Key: "prior.content.ledger", Value: 0.03, Unit: "1", Meaning: "spread of a content known from the ledger, for each use that may not have been written down", Source: commonPractice},
		{Key: "prior.content.ledger-month", Value: 0.02, Unit: "1", Meaning: "further spread a month for volatile liquids", Source: commonPractice},
		{Key: "prior.content.level-clear", Value: 0.08, Unit: "1", Meaning: "spread of a level read in a clear bottle, of the bottle's size", Source: commonPractice},
		{Key: "prior.content.level-amber", Value: 0.12, Unit: "1", Meaning: "spread of a level read in an amber bottle, of the bottle's size", Source: commonPractice},
		{Key: "prior.content.level-powder", Value: 0.15, Unit: "1", Meaning: "spread of a level read in a powder jar, of the jar's size", Source: commonPractice},
		{Key: "prior.content.guessed", Value: 0.20, Unit: "1", Meaning: "spread of a guess, of the bottle's size", Source: commonPractice},
		{Key: "prior.missing.recent", Value: 0.02, Unit: "1", Meaning: "chance that a bottle seen within 30 days isn't found", Source: commonPractice},
		{Key: "prior.missing.year", Value: 0.05, Unit: "1", Meaning: "chance that a bottle seen within a year isn't found", Source: commonPractice},
		{Key: "prior.missing.older", Value: 0.15, Unit: "1", Meaning: "chance that a bottle unseen for longer isn't found", Source: commonPractice},
	}
}

func lossPriors() []PolicyRow {
	return []PolicyRow{
		{Key: "prior.solvent-loss.mean", Value: 0.05, Unit: "1", Meaning: "solvent lost in an extraction by evaporation and wetting, mean", Source: commonPractice},
		{Key: "prior.solvent-loss.sd", Value: 0.03, Unit: "1", Meaning: "the same, spread of the lognormal", Source: commonPractice},
		{Key: "prior.drying-agent.sd", Value: 0.40, Unit: "1", Meaning: "relative spread of the drying agent used, lognormal", Source: commonPractice},
		{Key: "prior.emulsion.chance", Value: 0.10, Unit: "1", Meaning: "share of work-ups with an emulsion that needs a second solvent charge (5 to 15 %)", Source: commonPractice},
		{Key: "prior.emulsion.extra", Value: 0.75, Unit: "1", Meaning: "size of that charge against the first (50 to 100 %)", Source: commonPractice},
		{Key: "prior.acid-base.sd", Value: 0.075, Unit: "1", Meaning: "relative spread of acid or base for setting a pH (10 to 20 % either way, as two spreads)", Source: commonPractice},
		{Key: "prior.quench.low", Value: 1.1, Unit: "1", Meaning: "least reductant for left-over oxidant against theory", Source: commonPractice},
		{Key: "prior.quench.high", Value: 1.5, Unit: "1", Meaning: "most reductant for left-over oxidant against theory", Source: commonPractice},
		{Key: "prior.hold-up", Value: 0.02, Unit: "1", Meaning: "product left in an interface, on a drying agent or in the ware, each (1 to 3 %)", Source: commonPractice},
		{Key: "prior.cylinder", Value: 0.01, Unit: "1", Meaning: "spread of a volume from a measuring cylinder", Source: commonPractice},
		{Key: "prior.balance", Value: 0.001, Unit: "1", Meaning: "spread of a mass from a balance", Source: commonPractice},
		{Key: "prior.lead.stock-median", Value: 3, Unit: "d", Meaning: "lead time of a stock item, median", Source: commonPractice},
		{Key: "prior.lead.stock-p90", Value: 8, Unit: "d", Meaning: "lead time of a stock item, nine in ten", Source: commonPractice},
		{Key: "prior.lead.maker-median", Value: 15, Unit: "d", Meaning: "lead time of a maker's item, median", Source: commonPractice},
		{Key: "prior.lead.maker-p90", Value: 35, Unit: "d", Meaning: "lead time of a maker's item, nine in ten", Source: commonPractice},
	}
}

func heatDefaults() []PolicyRow {
	return []PolicyRow{
		{Key: "heat.u", Value: 200, Unit: "W/(m2.K)", Meaning: "heat transfer coefficient of a stirred glass flask in a bath; confirm for your own", Source: "from memory"},
		{Key: "heat.gap", Value: 10, Unit: "K", Meaning: "gap between bath and contents during an addition", Source: "from memory"},
		{Key: "heat.ice-spare", Value: 1.25, Unit: "1", Meaning: "ice taken against ice melted by the heat", Source: commonPractice},
	}
}
