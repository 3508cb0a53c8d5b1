package plan

// Uncertainty says how well the inputs of a shot are known: one standard
// deviation each, in percent of the input. Zero means the default, which the
// reckoning names beside each contribution.
type Uncertainty struct {
	KVPct         float64 `json:"kvPct,omitzero"`         // tube voltage
	MAPct         float64 `json:"maPct,omitzero"`         // tube current
	OutputPct     float64 `json:"outputPct,omitzero"`     // output of the head or rate constant of the nuclide, against the model's
	FilterPct     float64 `json:"filterPct,omitzero"`     // thickness of the filters
	ActivityPct   float64 `json:"activityPct,omitzero"`   // activity on the certificate
	ThicknessPct  float64 `json:"thicknessPct,omitzero"`  // thickness of the layers
	MaterialPct   float64 `json:"materialPct,omitzero"`   // density of their materials
	SFDPct        float64 `json:"sfdPct,omitzero"`        // source to film
	SpeedPct      float64 `json:"speedPct,omitzero"`      // dose that the film or the detector takes
	ProcessingPct float64 `json:"processingPct,omitzero"` // dose, by age and temperature of the developer
	ModelPct      float64 `json:"modelPct,omitzero"`      // scatter and the detector's response to energy
}

// FilmData are figures of one make of film, from its data sheet or certificate.
// Zero means the class's.
type FilmData struct {
	KsMGy      float64 `json:"ksMGy,omitzero"`      // dose for density 2 above base and fog in the beam of ISO 7004, 0.1 to 500 mGy; speed S is 1000/KsMGy
	G2         float64 `json:"g2,omitzero"`         // gradient at density 2 above base and fog, 2 to 8
	G4         float64 `json:"g4,omitzero"`         // gradient at density 4 above base and fog, 2 to 14
	BaseAndFog float64 `json:"baseAndFog,omitzero"` // density of the unexposed developed film, 0.05 to 0.6
}

var filmDataFields = []Field{
	{Path: "detector.film.data", Kind: Object, Default: "the figures of the class", Meaning: "the make's own figures in place of its class's"},
	{Path: "detector.film.data.ksMGy", Kind: Number, Unit: "mGy", Min: 0.1, Max: 500, Step: 0.1, Usual: []float64{2.5, 5, 8.3, 18, 29, 45}, Default: "that of the class",
		Meaning: "dose for density 2 above base and fog in the beam of ISO 7004; its speed S is 1000/ksMGy"},
	{Path: "detector.film.data.g2", Kind: Number, Min: 2, Max: 8, Step: 0.1, Usual: []float64{3.5, 3.8, 4.1, 4.3, 4.5}, Default: "the floor of the class", Meaning: "gradient at density 2 above base and fog"},
	{Path: "detector.film.data.g4", Kind: Number, Min: 2, Max: 14, Step: 0.1, Usual: []float64{5, 6.4, 6.8, 7.4, 7.5}, Default: "the floor of the class", Meaning: "gradient at density 4 above base and fog"},
	{Path: "detector.film.data.baseAndFog", Kind: Number, Min: 0.05, Max: 0.6, Step: 0.01, Usual: []float64{0.2, 0.25, 0.3}, Default: "0.25", Meaning: "density of the unexposed developed film"},
}

var uncertaintyFields = []Field{
	{Path: "uncertainty", Kind: Object, Default: "by input, told with the spread", Meaning: "how well the inputs are known: one standard deviation each, in percent of the input"},
	uncertain("kvPct", "1 %", "tube voltage"),
	uncertain("maPct", "2 %", "tube current"),
	uncertain("outputPct", "half of what the model of the source states", "output of the head or rate constant of the nuclide, against the model's"),
	uncertain("filterPct", "3 %", "thickness of the filters"),
	uncertain("activityPct", "5 %", "activity on the certificate"),
	uncertain("thicknessPct", "2 %", "thickness of the layers"),
	uncertain("materialPct", "1 %", "density of the layers' materials"),
	uncertain("sfdPct", "1 %", "source to film"),
	uncertain("speedPct", "12 % for film, 30 % for plates and panels", "dose that the film or the detector takes"),
	uncertain("processingPct", "7 %; none for plates and panels", "dose, by age and temperature of the developer"),
	uncertain("modelPct", "by source and share of scatter", "scatter and the detector's response to energy"),
}

func uncertain(name, def, meaning string) Field {
	return Field{Path: "uncertainty." + name, Kind: Number, Unit: "%", Min: 0.01, Max: 50, Step: 0.5, Usual: []float64{0.5, 1, 2, 3, 5, 10, 15, 20, 30}, Default: def, Meaning: meaning}
}
