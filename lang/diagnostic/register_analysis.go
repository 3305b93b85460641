package diagnostic

// The names of what analysis has to say.
const (
	Mechanism           Name = "mechanism"
	SoftStructure       Name = "soft-structure"
	IllConditioned      Name = "ill-conditioned"
	LostDigits          Name = "lost-digits"
	NoEquilibrium       Name = "no-equilibrium"
	OneWayCycling       Name = "one-way-cycling"
	CannotSolve         Name = "cannot-solve"
	TooManyCombinations Name = "too-many-combinations"
	UnknownRule         Name = "unknown-rule"
	UnknownCombination  Name = "unknown-combination"
	LimitExceeded       Name = "limit-exceeded"
	LimitUnanswered     Name = "limit-unanswered"
)

func analysisEntries() []Entry {
	return []Entry{
		{
			Name: Mechanism, Severity: Error, Title: "The structure can move without resistance",
			Explanation: "Some nodes can move together, in the way that the message describes, without any member being stretched, bent or twisted and without any support resisting. Such a model has no answer, so no numbers are shown. As a rule a support is missing, there is a hinge too many, or bars lie in one line or plane.",
			Example:     "node A = (0, 0) m\nnode B = (4, 0) m\nbeam b = A -> B of s\nsupport A pinned",
			Mend:        "Hold what moves: here a second support, such as \"support B holds uz\". The message names the smallest restraint that was found to do.",
		},
		{
			Name: SoftStructure, Severity: Warning, Title: "The structure is close to a mechanism",
			Explanation: "The structure resists the movement that the message describes, but so weakly beside its other stiffnesses that it may not be meant so.",
			Example:     "support A holds ux uz, spring ry 1e-6 kNm/rad",
			Mend:        "Check the connections and stiffnesses of the parts that the message names.",
		},
		{
			Name: IllConditioned, Severity: Warning, Title: "Very stiff beside very soft",
			Explanation: "The stiffnesses in the model differ so much that digits are lost: a small change of the input would change the results noticeably. The results are shown, with fewer digits to be trusted than usual.",
			Example:     "spring k = A -> B, along 1e15 kN/m",
			Mend:        "Use a link where a rigid connection is meant, and check the units of very large and very small stiffnesses.",
		},
		{
			Name: LostDigits, Severity: Warning, Title: "The solution satisfies the equations less well than it should",
			Explanation: "After the solve the equations of equilibrium were checked with the movements found. What is left over, set against the size of the terms, is larger than rounding explains.",
			Example:     "spring k = A -> B, along 1e15 kN/m",
			Mend:        "Check the units of very large and very small stiffnesses. If nothing is wrong there, treat the results as doubtful.",
		},
		{
			Name: NoEquilibrium, Severity: Error, Title: "Loads and reactions do not balance",
			Explanation: "The sum of the loads and the reactions, and of their moments about the origin, is not zero within rounding. Results that do not balance must not be used.",
			Example:     "spring k = A -> B, along 1e15 kN/m",
			Mend:        "Check the units of very large and very small stiffnesses. If nothing is wrong there, please report the model.",
		},
		{
			Name: OneWayCycling, Severity: Error, Title: "One-way members or supports do not settle",
			Explanation: "Members that take tension only or compression only, and supports that push only, are switched off and on until all agree with the forces in them. Here no state was found in which they agree, so there is no result for this case or combination.",
			Example:     "bar t1 = B -> D of rod, tension only",
			Mend:        "Give the structure a stiffness that does not depend on one-way parts, or a pretension to those that go slack.",
		},
		{
			Name: CannotSolve, Severity: Error, Title: "The model cannot be solved",
			Explanation: "The model asks for something that has no answer, which the message describes.",
			Example:     "section s = { A 20 cm2 } of steel\nbeam b = A -> B of s",
			Mend:        "Do what the message says: here give the section its Iy.",
		},
		{
			Name: TooManyCombinations, Severity: Error, Title: "A family asks for too many combinations",
			Explanation: "Every mixture of favourable and unfavourable, leading and accompanying cases is a combination. Their number grows steeply with the number of cases. Beyond the bound none of them is formed.",
			Example:     "family ULS by EN1990 strength    # of twelve permanent and ten imposed cases",
			Mend:        "Join permanent cases that come from one source into one case, or write \"rule one-source\" after the family; declare with alternate which cases never act together.",
		},
		{
			Name: UnknownRule, Severity: Error, Title: "The code has no such rule",
			Explanation: "A family asks for combinations or a rule that its code of practice does not have.",
			Example:     "family ULS by ASCE7 frequent",
			Mend:        "family ULS by ASCE7 allowable",
		},
		{
			Name: UnknownCombination, Severity: Error, Title: "No combination of this name",
			Explanation: "A limit names a combination that its family does not have. Combinations that a code asks for are called after their cases, the leading one first: ULS.S_W has snow leading and wind beside it, ULS.W_low is wind with the least permanent load.",
			Example:     "limit deflection of r1 <= length/250 under SLS.Snow",
			Mend:        "limit deflection of r1 <= length/250 under SLS.S",
		},
		{
			Name: LimitExceeded, Severity: Error, Title: "A limit is broken",
			Explanation: "The value in the governing combination lies beyond the bound that the model sets.",
			Example:     "limit deflection of r1 <= length/250 under SLS",
			Mend:        "Use a stiffer or stronger section, change the structure, or change the limit if it was not meant so.",
		},
		{
			Name: LimitUnanswered, Severity: Warning, Title: "A limit was not checked",
			Explanation: "The results at hand do not answer the limit, for the reason that the message gives. It counts neither as met nor as broken.",
			Example:     "limit stress of b <= 100 MPa under G    # a section without Wy",
			Mend:        "Supply what is missing: here Wy in the section's braces.",
		},
	}
}
