package inventory

// dayDefaults say when people are at the bench.
func dayDefaults() []PolicyRow {
	return []PolicyRow{
		{Key: "day.start", Value: 8.5, Unit: "h", Meaning: "time of day at which bench work begins, in hours after midnight", Source: commonPractice},
		{Key: "day.end", Value: 17, Unit: "h", Meaning: "time of day by which a hold point has to be reached, in hours after midnight", Source: commonPractice},
		{Key: "day.break-from", Value: 12, Unit: "h", Meaning: "time of day at which the midday break begins, in hours after midnight", Source: commonPractice},
		{Key: "day.break", Value: 0.5, Unit: "h", Meaning: "length of the midday break; steps that run over it take that much longer", Source: commonPractice},
		{Key: "day.week", Value: 5, Unit: "1", Meaning: "days of the week on which people are at the bench, from Monday on", Source: commonPractice},
	}
}
