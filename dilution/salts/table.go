package salts

// Published figures with which a molar mass and its formula were found to
// agree. A salt without one is used with the caution figure-unverified.
const (
	smpcSodium          = "UK/EU SmPC, noradrenaline 1 mg/mL concentrate: 6.7 mg of sodium is 0.29 mmol"
	smpcMagnesium       = "UK SmPC, magnesium sulfate 50 % w/v, 10 October 2019: about 2 mmol/mL, 1 g is about 4 mmol"
	smpcNoradrenaline   = "UK/EU SmPC, noradrenaline 1 mg/mL concentrate: 2 mg of acid tartrate is 1 mg of base"
	labelMagnesium      = "US product label, magnesium chloride hexahydrate 200 mg/mL: 1.97 mEq/mL"
	labelGlucose        = "US product labels: glucose monohydrate, molecular weight 198.17"
	labelDobutamine     = "US prescribing information, dobutamine: 1.12 microgram of hydrochloride is about 1 microgram of base"
	icuManual           = "New Zealand intensive-care drug manual, appendix 10: calcium chloride 10 %, 10 mL is 6.8 mmol of calcium and 13.6 mmol of chloride; sodium bicarbonate 8.4 % is 1 mmol/mL"
	labelElectrolytes   = "US product label, potassium chloride in 0.45 % sodium chloride: sodium chloride 4.5 g/L is 77 mEq/L, potassium chloride 1.49 g/L is 20 mEq/L"
	uspFentanyl         = "United States Pharmacopeia 2025, Fentanyl Citrate: C22H28N2O with C6H8O7, 528.60"
	bpKetamine          = "British Pharmacopoeia (Ph. Eur. monograph 1020), Ketamine Hydrochloride: C13H17Cl2NO, 274.2"
	uspMorphine         = "United States Pharmacopeia 32, Morphine Sulfate: (C17H19NO3)2 with H2SO4 and 5 H2O, 758.83"
	uspAtropine         = "United States Pharmacopeia 32, Atropine Sulfate: (C17H23NO3)2 with H2SO4 and H2O, 694.83"
	uspLidocaine        = "United States Pharmacopeia 35, Lidocaine Hydrochloride: C14H22N2O with HCl and H2O, 288.81"
	labelDopamine       = "US prescribing information, dopamine: C8H11NO2 with HCl, 189.64; 80 mg is 64.6 mg of base"
	zurichPhenylephrine = "University of Zurich, veterinary drug compendium, phenylephrine: base C9H13NO2, 167.207; hydrochloride C9H14ClNO2, 203.67"
	icuPhosphate        = "intensive-care teaching text, potassium dihydrogen phosphate: 1.361 g in 10 mL is 1 mmol/mL of potassium and of phosphate"
	uspSuxamethonium    = "United States Pharmacopeia 2025, Succinylcholine Chloride: C14H30Cl2N2O4 361.31, with 2 H2O 397.34"
	uspAminophylline    = "United States Pharmacopeia 2025, Aminophylline: C16H24N10O4 with 2 H2O, 456.46"
	labelAtracurium     = "US prescribing information, atracurium, of which cisatracurium is one isomer: C65H82N2O18S2, 1243.49"
	bpAdrenaline        = "British Pharmacopoeia 2012, Adrenaline Injection: acid tartrate 0.18 % holds 0.09 to 0.11 % of base"
)

// table lists the salts. Molar masses are in units of 0.00001 g/mol, summed
// from the IUPAC weights; the test sums the formulae again.
func table() []Salt {
	return []Salt{
		{name: "sodium", formula: "Na", molar: 2298977, ions: []Ion{{"sodium", 1, 1}}, checked: smpcSodium},
		{name: "potassium", formula: "K", molar: 3909830, ions: []Ion{{"potassium", 1, 1}}},
		{name: "calcium", formula: "Ca", molar: 4007800, ions: []Ion{{"calcium", 1, 2}}},
		{name: "magnesium", formula: "Mg", molar: 2430500, ions: []Ion{{"magnesium", 1, 2}}},
		{name: "chloride", formula: "Cl", molar: 3545000, ions: []Ion{{"chloride", 1, 1}}},
		{name: "sodium chloride", formula: "NaCl", molar: 5843977, ions: []Ion{{"sodium", 1, 1}, {"chloride", 1, 1}}, checked: labelElectrolytes},
		{name: "potassium chloride", formula: "KCl", molar: 7454830, ions: []Ion{{"potassium", 1, 1}, {"chloride", 1, 1}}, checked: labelElectrolytes},
		{name: "sodium bicarbonate", formula: "NaHCO3", molar: 8400577, ions: []Ion{{"sodium", 1, 1}, {"bicarbonate", 1, 1}}, checked: icuManual},
		{name: "calcium chloride dihydrate", formula: "CaCl2.2H2O", molar: 14700800, ions: []Ion{{"calcium", 1, 2}, {"chloride", 2, 1}}, checked: icuManual},
		{name: "calcium chloride hexahydrate", formula: "CaCl2.6H2O", molar: 21906800, ions: []Ion{{"calcium", 1, 2}, {"chloride", 2, 1}}},
		{name: "calcium gluconate monohydrate", formula: "C12H22CaO14.H2O", molar: 44838700, ions: []Ion{{"calcium", 1, 2}, {"gluconate", 2, 1}}},
		{name: "magnesium sulfate heptahydrate", formula: "MgSO4.7H2O", molar: 24646600, ions: []Ion{{"magnesium", 1, 2}, {"sulfate", 1, 2}}, checked: smpcMagnesium},
		{name: "magnesium chloride hexahydrate", formula: "MgCl2.6H2O", molar: 20329500, ions: []Ion{{"magnesium", 1, 2}, {"chloride", 2, 1}}, checked: labelMagnesium},
		{name: "potassium dihydrogen phosphate", formula: "KH2PO4", molar: 13608406, ions: []Ion{{"potassium", 1, 1}, {"phosphate", 1, 1}}, checked: icuPhosphate},
		{name: "dipotassium hydrogen phosphate", formula: "K2HPO4", molar: 17417436, ions: []Ion{{"potassium", 2, 1}, {"phosphate", 1, 2}}},
		{name: "sodium dihydrogen phosphate dihydrate", formula: "NaH2PO4.2H2O", molar: 15600553, ions: []Ion{{"sodium", 1, 1}, {"phosphate", 1, 1}}},
		{name: "sodium acetate trihydrate", formula: "C2H3NaO2.3H2O", molar: 13607877, ions: []Ion{{"sodium", 1, 1}, {"acetate", 1, 1}}},
		{name: "sodium lactate", formula: "C3H5NaO3", molar: 11205977, ions: []Ion{{"sodium", 1, 1}, {"lactate", 1, 1}}},
		{name: "trometamol", formula: "C4H11NO3", molar: 12113600},
		{name: "glucose", formula: "C6H12O6", molar: 18015600},
		{name: "glucose monohydrate", formula: "C6H12O6.H2O", molar: 19817100, checked: labelGlucose},
		{name: "noradrenaline acid tartrate monohydrate", formula: "C8H11NO3.C4H6O6.H2O", molar: 33728100, base: "noradrenaline", baseFormula: "C8H11NO3", baseMolar: 16918000, baseCount: 1, checked: smpcNoradrenaline},
		{name: "adrenaline acid tartrate", formula: "C9H13NO3.C4H6O6", molar: 33329300, base: "adrenaline", baseFormula: "C9H13NO3", baseMolar: 18320700, baseCount: 1, checked: bpAdrenaline},
		{name: "adrenaline hydrochloride", formula: "C9H13NO3.HCl", molar: 21966500, base: "adrenaline", baseFormula: "C9H13NO3", baseMolar: 18320700, baseCount: 1},
		{name: "dobutamine hydrochloride", formula: "C18H23NO3.HCl", molar: 33784400, base: "dobutamine", baseFormula: "C18H23NO3", baseMolar: 30138600, baseCount: 1, checked: labelDobutamine},
		{name: "dopamine hydrochloride", formula: "C8H11NO2.HCl", molar: 18963900, base: "dopamine", baseFormula: "C8H11NO2", baseMolar: 15318100, baseCount: 1, checked: labelDopamine},
		{name: "isoprenaline hydrochloride", formula: "C11H17NO3.HCl", molar: 24771900, base: "isoprenaline", baseFormula: "C11H17NO3", baseMolar: 21126100, baseCount: 1},
		{name: "phenylephrine hydrochloride", formula: "C9H13NO2.HCl", molar: 20366600, base: "phenylephrine", baseFormula: "C9H13NO2", baseMolar: 16720800, baseCount: 1, checked: zurichPhenylephrine},
		{name: "metaraminol acid tartrate", formula: "C9H13NO2.C4H6O6", molar: 31729400, base: "metaraminol", baseFormula: "C9H13NO2", baseMolar: 16720800, baseCount: 1},
		{name: "ephedrine hydrochloride", formula: "C10H15NO.HCl", molar: 20169400, base: "ephedrine", baseFormula: "C10H15NO", baseMolar: 16523600, baseCount: 1},
		{name: "fentanyl citrate", formula: "C22H28N2O.C6H8O7", molar: 52860200, base: "fentanyl", baseFormula: "C22H28N2O", baseMolar: 33647900, baseCount: 1, checked: uspFentanyl},
		{name: "remifentanil hydrochloride", formula: "C20H28N2O5.HCl", molar: 41291100, base: "remifentanil", baseFormula: "C20H28N2O5", baseMolar: 37645300, baseCount: 1},
		{name: "sufentanil citrate", formula: "C22H30N2O2S.C6H8O7", molar: 57867700, base: "sufentanil", baseFormula: "C22H30N2O2S", baseMolar: 38655400, baseCount: 1},
		{name: "alfentanil hydrochloride", formula: "C21H32N6O3.HCl", molar: 45298400, base: "alfentanil", baseFormula: "C21H32N6O3", baseMolar: 41652600, baseCount: 1},
		{name: "morphine sulfate pentahydrate", formula: "2C17H19NO3.H2SO4.5H2O", molar: 75883300, base: "morphine", baseFormula: "C17H19NO3", baseMolar: 28534300, baseCount: 2, checked: uspMorphine},
		{name: "ketamine hydrochloride", formula: "C13H16ClNO.HCl", molar: 27418500, base: "ketamine", baseFormula: "C13H16ClNO", baseMolar: 23772700, baseCount: 1, checked: bpKetamine},
		{name: "lidocaine hydrochloride monohydrate", formula: "C14H22N2O.HCl.H2O", molar: 28881600, base: "lidocaine", baseFormula: "C14H22N2O", baseMolar: 23434300, baseCount: 1, checked: uspLidocaine},
		{name: "bupivacaine hydrochloride monohydrate", formula: "C18H28N2O.HCl.H2O", molar: 34290800, base: "bupivacaine", baseFormula: "C18H28N2O", baseMolar: 28843500, baseCount: 1},
		{name: "dexmedetomidine hydrochloride", formula: "C13H16N2.HCl", molar: 23674300, base: "dexmedetomidine", baseFormula: "C13H16N2", baseMolar: 20028500, baseCount: 1},
		{name: "atropine sulfate monohydrate", formula: "2C17H23NO3.H2SO4.H2O", molar: 69483700, base: "atropine", baseFormula: "C17H23NO3", baseMolar: 28937500, baseCount: 2, checked: uspAtropine},
		{name: "suxamethonium chloride dihydrate", formula: "C14H30Cl2N2O4.2H2O", molar: 39733400, base: "suxamethonium chloride, anhydrous", baseFormula: "C14H30Cl2N2O4", baseMolar: 36130400, baseCount: 1, checked: uspSuxamethonium},
		{name: "ropivacaine hydrochloride monohydrate", formula: "C17H26N2O.HCl.H2O", molar: 32888100, base: "ropivacaine hydrochloride, anhydrous", baseFormula: "C17H26N2O.HCl", baseMolar: 31086600, baseCount: 1},
		{name: "cisatracurium besilate", formula: "C53H72N2O12.2C6H5O3S", molar: 124348700, base: "cisatracurium cation", baseFormula: "C53H72N2O12", baseMolar: 92916100, baseCount: 1, checked: labelAtracurium},
		{name: "aminophylline dihydrate", formula: "2C7H8N4O2.C2H8N2.2H2O", molar: 45646400, base: "theophylline", baseFormula: "C7H8N4O2", baseMolar: 18016700, baseCount: 2, checked: uspAminophylline},
	}
}
