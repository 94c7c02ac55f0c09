package planner

// Severity says what a finding does to a plan.
type Severity int

// The severities: a note informs, a warning asks for a decision, a refusal
// means that there is no plan.
const (
	Note Severity = iota
	Warning
	Refusal
)

// Finding is something the plan has to say that is no number. Its kinds, in the
// order in which a chemist meets them:
//
//	no-density           the volume of something is counted as that of as much water
//	no-heat-capacity     something counts as nothing when heat is worked out
//	no-partition         something counts as staying in its own layer
//	no-boiling-point     something counts as staying in the pot of every distillation
//	scale-not-proven     no run of the recipe has been recorded
//	scale-beyond-proven  a batch is larger than the proven scale by more than the policy's factor
//	large-substrate      the limiting reagent of a batch counts as large
//	large-solvent        the organic solvents of a batch count as large
//	no-vessel-fits       a step needs ware the lab doesn't own; alone it is a refusal
//	no-ware-known        no ware is entered, so that vessel sizes are not assessed
//	no-fill-limit        the policy has no fill limit for a kind of ware, so none was picked
//	split                the run is planned in batches, because the ware holds no more
//	reagent-runs-out     a reaction stops short for want of a reagent
//	yield-beyond-balance the recipe's yield is more than its steps let through
//	stock-not-settled    the bottles chosen kept changing with the water they bring
//	blend                a bottle too weak alone is blended with a stronger one
//	bottles-not-proven   a choice of bottles with less trouble may exist
//	order-not-proven     a cheaper order may exist
//	no-order             no order could be worked out
//	carriers-not-proven  fewer carriers may do
//	no-carriers          the bottles could not be put into carriers
//	no-room-for-waste    no carboy takes a waste lot
//	not-a-working-day    nobody is at the bench on the day of the run
//	hold-too-long        the run would stand at a hold point for longer than the recipe allows
//	past-the-day         steps that have to be done in one go end after the working day
//	no-working-day       the policy's working day can't be read
//	policy-row-missing   a row of the policy table was taken from the delivered table
type Finding struct {
	Kind     string
	Severity Severity
	Step     int // 0 for the whole run
	Text     string
	Would    string // what would do instead
}
