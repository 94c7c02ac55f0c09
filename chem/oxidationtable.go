package chem

// The numbers that the rules of oxidation take as known: OpenStax Chemistry 2e, 4.2, and
// the usual numbers of the common anions (IUPAC Red Book 2005, table IX), from memory.

// fixedNumber returns the number of elements that have one in compounds.
func fixedNumber(z uint8) (float64, bool) {
	switch z {
	case 9:
		return -1, true
	case 3, 11, 19, 37, 55, 87, 47: // group 1, silver
		return 1, true
	case 4, 12, 20, 38, 56, 88, 30, 48: // group 2, zinc, cadmium
		return 2, true
	case 13, 31, 21, 39, 57: // aluminium, gallium, group 3
		return 3, true
	}
	return 0, false
}

// highestNumber returns the group number that an element doesn't pass.
func highestNumber(z uint8) (float64, bool) {
	switch z {
	case 5:
		return 3, true
	case 6, 14, 22:
		return 4, true
	case 7, 15, 33, 23:
		return 5, true
	case 16, 34, 24, 42, 74:
		return 6, true
	case 17, 35, 53, 25:
		return 7, true
	}
	return 0, false
}

// oxoNumber returns the number of the central atom of an anion with so many oxygen
// atoms for each: sulfate 4, nitrate 3, carbonate 3, phosphate 4 and so on.
func oxoNumber(z uint8, oxygen float64) (float64, bool) {
	switch [2]float64{float64(z), oxygen} {
	case [2]float64{16, 1.5}:
		return 2, true // thiosulfate
	case [2]float64{16, 2}, [2]float64{7, 2}, [2]float64{6, 2}, [2]float64{17, 2}, [2]float64{5, 3}:
		return 3, true // dithionite, nitrite, oxalate, chlorite, borate
	case [2]float64{16, 3}, [2]float64{16, 2.5}, [2]float64{6, 3}, [2]float64{14, 4}, [2]float64{14, 3}, [2]float64{34, 3}:
		return 4, true // sulfite, metabisulfite, carbonate, silicates, selenite
	case [2]float64{7, 3}, [2]float64{15, 4}, [2]float64{15, 3.5}, [2]float64{33, 4},
		[2]float64{17, 3}, [2]float64{35, 3}, [2]float64{53, 3}:
		return 5, true // nitrate, phosphate, diphosphate, arsenate, chlorate, bromate, iodate
	case [2]float64{16, 4}, [2]float64{34, 4}, [2]float64{24, 4}, [2]float64{24, 3.5}, [2]float64{42, 4}, [2]float64{74, 4}:
		return 6, true // sulfate, selenate, chromate, dichromate, molybdate, tungstate
	case [2]float64{17, 4}, [2]float64{53, 4}:
		return 7, true // perchlorate, periodate
	case [2]float64{17, 1}, [2]float64{35, 1}:
		return 1, true // hypochlorite, hypobromite
	}
	return 0, false
}
