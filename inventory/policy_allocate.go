package inventory

// allocateDefaults are the prices, in points, of what a planner would rather
// not do when it chooses bottles. Only their ratios matter.
func allocateDefaults() []PolicyRow {
	return []PolicyRow{
		{Key: "allocate.opening", Value: 100, Unit: "1", Meaning: "points for opening a sealed bottle", Source: commonPractice},
		{Key: "allocate.bottle", Value: 10, Unit: "1", Meaning: "points for fetching one more bottle", Source: commonPractice},
		{Key: "allocate.finished", Value: 6, Unit: "1", Meaning: "points saved by finishing a bottle", Source: commonPractice},
		{Key: "allocate.useless-heel", Value: 15, Unit: "1", Meaning: "points for leaving a heel that is of no use", Source: commonPractice},
		{Key: "allocate.later", Value: 0.1, Unit: "1/d", Meaning: "points for each day a bottle keeps longer than the first to expire, in the share drawn from it", Source: commonPractice},
		{Key: "allocate.later-most", Value: 60, Unit: "1", Meaning: "most points for drawing on a bottle that keeps longer; also for one without a date", Source: commonPractice},
		{Key: "allocate.walk", Value: 0.1, Unit: "1", Meaning: "points for each position further along the walk past the places", Source: commonPractice},
		{Key: "prior.missing.most-size", Value: 20, Unit: "L", Meaning: "size, in litres or kilograms, from which a container isn't mislaid", Source: commonPractice},
		{Key: "slate.steps", Value: 24, Unit: "1", Meaning: "halvings of the interval when the largest batch is looked for", Source: commonPractice},
	}
}
