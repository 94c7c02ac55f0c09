package inventory

// ValidCAS reports whether s is a CAS registry number with a check digit that
// fits: two to seven digits, two digits, and one that is the sum of the others,
// counted from the right and weighted 1, 2, 3, …, modulo 10 (CAS, "Check Digit
// Verification of CAS Registry Numbers").
func ValidCAS(s string) bool {
	n := len(s)
	if n < 7 || n > 12 || s[n-2] != '-' || s[n-5] != '-' {
		return false
	}
	sum, weight := 0, 1
	for i := n - 3; i >= 0; i-- {
		if i == n-5 {
			continue
		}
		if s[i] < '0' || s[i] > '9' {
			return false
		}
		sum += weight * int(s[i]-'0')
		weight++
	}
	return s[n-1] >= '0' && s[n-1] <= '9' && sum%10 == int(s[n-1]-'0')
}
