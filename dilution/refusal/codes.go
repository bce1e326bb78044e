package refusal

// A Code names one fault, in kebab-case. A code never changes its meaning. Each
// has an entry in [All] and an example that a test runs.
type Code string

// Faults of a text that should be a quantity. They equal quantity.Fault.
const (
	QuantityMissing  Code = "quantity-missing"
	NumberWithComma  Code = "number-with-comma"
	NumberMalformed  Code = "number-malformed"
	NumberTooLong    Code = "number-too-long"
	UnitUnknown      Code = "unit-unknown"
	UnitWrongKind    Code = "unit-wrong-kind"
	QuantityZero     Code = "quantity-zero"
	RatioStrength    Code = "ratio-strength"
	AmountKindDiffer Code = "units-against-mass"
)

// Faults of a file.
const (
	FileUnreadable   Code = "file-unreadable"
	FileEmpty        Code = "file-empty"
	FileTooLarge     Code = "file-too-large"
	FileNotText      Code = "file-not-text"
	FileSyntax       Code = "file-syntax"
	KeyUnknown       Code = "key-unknown"
	KeyRepeated      Code = "key-repeated"
	KeyMissing       Code = "key-missing"
	KeyConflict      Code = "keys-contradict"
	ValueWrongType   Code = "value-wrong-type"
	ValueUnknown     Code = "value-unknown"
	TimeMalformed    Code = "time-malformed"
	LimitLoosened    Code = "limit-loosened-without-reason"
	SourceNowhere    Code = "source-without-jurisdiction"
	ContentsUnlike   Code = "contents-unlike-identifier"
	FactorOff        Code = "factor-off-molar-mass"
	StandardOutside  Code = "standard-outside-bounds"
	StandardDiluent  Code = "standard-not-makeable"
	RowsOverlap      Code = "rows-overlap"
	Implausible      Code = "figure-implausible"
	ApprovedOnce     Code = "approved-by-one-person"
	ApprovedOther    Code = "approved-another-formulary"
	ApprovalPast     Code = "approval-not-in-force"
	OutputUnwritable Code = "output-unwritable"
	NothingToMake    Code = "nothing-to-make"
	SyringesMany     Code = "too-many-syringes"
	SyringeNumber    Code = "syringe-number-unknown"
)

// Faults of a patient.
const (
	WeightMissing     Code = "weight-missing"
	WeightImplausible Code = "weight-implausible"
	SurfaceMissing    Code = "surface-missing"
	HeightMissing     Code = "height-missing"
	HeightImplausible Code = "height-implausible"
	SexMissing        Code = "sex-missing"
	AgeMissing        Code = "age-missing"
	BodySizeOutside   Code = "body-size-outside-equation"
	LeanPlateau       Code = "lean-weight-above-plateau"
	WeightEstimated   Code = "weight-estimated"
	BodyValuesStrange Code = "body-values-do-not-fit"
)

// Faults of an order against the formulary.
const (
	DrugUnknown            Code = "drug-unknown"
	PresentationUnknown    Code = "presentation-unknown"
	PresentationUnclear    Code = "presentation-unclear"
	PresentationNotPump    Code = "presentation-not-for-pump"
	StandardUnknown        Code = "standard-preparation-unknown"
	DiluentForbidden       Code = "diluent-forbidden"
	DiluentNotListed       Code = "diluent-not-listed"
	DiluentMissing         Code = "diluent-missing"
	MustBeDiluted          Code = "must-be-diluted"
	RouteNotListed         Code = "route-not-listed"
	NeverAsInfusion        Code = "never-as-infusion"
	NeverAsBolus           Code = "never-as-bolus"
	FormularyBlank         Code = "formulary-blank"
	DisplacementBlank      Code = "displacement-blank"
	ConcentrationTooHigh   Code = "concentration-above-limit"
	ConcentrationTooLow    Code = "concentration-below-limit"
	DoseAboveHard          Code = "dose-above-hard-limit"
	DoseAboveSoft          Code = "dose-above-soft-limit"
	DoseAboveUsual         Code = "dose-above-usual"
	DoseBelowSoft          Code = "dose-below-usual"
	DoseBelowHard          Code = "dose-below-hard-limit"
	DoseAboveTotal         Code = "dose-above-absolute-maximum"
	RateAboveHard          Code = "dose-rate-above-hard-limit"
	RateAboveSoft          Code = "dose-rate-above-soft-limit"
	RateAboveUsual         Code = "dose-rate-above-usual"
	WeightFromFormulary    Code = "weight-kind-from-formulary"
	WeightBasisUnlike      Code = "weight-kind-unlike-formulary"
	RateBelowHard          Code = "dose-rate-below-hard-limit"
	RateBelowSoft          Code = "dose-rate-below-usual"
	AgeOutside             Code = "age-outside-range"
	SlipThousand           Code = "thousandfold-slip"
	SlipTen                Code = "tenfold-slip"
	IndicationUnclear      Code = "indication-unclear"
	RoundedPastLimit       Code = "limit-passed-by-rounding"
	SoftLimitNotSigned     Code = "soft-limit-not-acknowledged"
	Unverified             Code = "figure-unverified"
	AssayAssumed           Code = "assay-limits-assumed"
	ContradictoryAmounts   Code = "amounts-contradict"
	ExpiredPresentation    Code = "presentation-expired"
	UseByUnknown           Code = "use-by-unknown"
	NegligibleDisplacement Code = "displacement-negligible"
	PreservedNeuraxial     Code = "preserved-near-nerves"
	DoseAboveFirst         Code = "dose-above-first-maximum"
	DoseAboveDay           Code = "dose-above-day-maximum"
	AmountAboveCourse      Code = "amount-above-course-maximum"
	RunsTooLong            Code = "runs-longer-than-allowed"
	FrailBlank             Code = "no-figures-for-the-frail"
	StandardElsewhere      Code = "standard-of-another-jurisdiction"
	LocalSum               Code = "local-anaesthetic-sum"
)

// Faults of measuring.
const (
	VolumeBelowMeasurable Code = "volume-below-measurable"
	VolumeOffGraduation   Code = "volume-off-graduation"
	VolumeAboveSyringe    Code = "volume-above-syringe"
	VolumeUnderFifth      Code = "volume-under-a-fifth-of-barrel"
	SyringeUnknown        Code = "syringe-size-unknown"
	ContainersMany        Code = "many-containers"
	BagFillUnknown        Code = "bag-fill-unknown"
	RateBelowPump         Code = "rate-below-pump-step"
	RateAbovePump         Code = "rate-above-pump"
	RateRounding          Code = "rate-rounding-large"
	RunsPastUseBy         Code = "runs-past-use-by"
	RateSlow              Code = "rate-slow-start"
)

// Faults of a shelf, and of planning from it.
const (
	ShelfEmpty        Code = "shelf-empty"
	BarrelNone        Code = "no-barrel-stocked"
	BarrelOffStandard Code = "barrel-against-standard"
	StockOtherDrug    Code = "presentation-of-another-drug"
	NotStocked        Code = "presentation-not-stocked"
	StockShort        Code = "stock-runs-short"
	NoneStockedFits   Code = "no-stocked-presentation-fits"
	DiluentNotStocked Code = "diluent-not-stocked"
	SyringeNotForPump Code = "syringe-not-for-pump"
	SearchCut         Code = "search-cut-short"
	DilutedToMeasure  Code = "diluted-to-be-measured"
	DeadSpaceCounts   Code = "dead-space-counts"
	HoursNotReached   Code = "hours-not-reached"
	MadeForOneWeight  Code = "made-for-one-weight"
)

// Faults of paper.
const (
	LabelTooSmall    Code = "label-too-small"
	LabelMoved       Code = "label-on-larger-stock"
	LabelsTogether   Code = "labels-printed-together"
	StockUnknown     Code = "stock-unknown"
	GlyphMissing     Code = "glyph-missing"
	TextTooLong      Code = "text-too-long"
	SyringesLeftOut  Code = "syringes-left-out"
	LimitsNotChecked Code = "limits-not-checked"
	QuickCheck       Code = "quick-sum-checked"
	RoutesDisagree   Code = "routes-disagree"
	FlagMissing      Code = "flag-missing"
	FlagConflict     Code = "flags-contradict"
	FlagUnknown      Code = "flag-unknown"
)
