package plan

import "slices"

// table is every field of a plan file. Another part of the program that adds a
// field to the types adds its row here, or a list of its own to the Concat.
var table = slices.Concat(topFields, tubeFields, sealedFields, partFields, setupFields, detectorFields, filmDataFields, siteFields, sitePlanFields, uncertaintyFields)

var topFields = []Field{
	{Path: "plan", Kind: Number, Required: true, Min: 1, Max: 1, Step: 1, Meaning: "version of the plan file"},
	{Path: "title", Kind: Text, Min: 1, Max: 120, Default: "none", Meaning: "what the crew calls the shot"},
	{Path: "at", Kind: Time, Min: 1950, Max: 2100, Default: "none; needed with a sealed source", Meaning: "time of the shot, to which a sealed source is decayed"},
	{Path: "source", Kind: Object, Required: true, Meaning: "exactly one of tube and sealed"},
}

var tubeFields = []Field{
	{Path: "source.tube", Kind: Object, Default: "none", Meaning: "an X-ray head as set for the shot"},
	{Path: "source.tube.kv", Kind: Number, Required: true, Unit: "kV", Min: 20, Max: 450, Step: 5,
		Usual: []float64{60, 80, 100, 120, 140, 160, 180, 200, 225, 250, 275, 300, 320, 350, 400, 450}, Meaning: "peak tube voltage"},
	{Path: "source.tube.ma", Kind: Number, Required: true, Unit: "mA", Min: 0.01, Max: 100, Step: 0.5,
		Usual: []float64{1, 2, 3, 4, 5, 6, 8, 10, 15, 20}, Meaning: "mean tube current"},
	{Path: "source.tube.focusMM", Kind: Number, Required: true, Unit: "mm", Min: 0.005, Max: 10, Step: 0.1,
		Usual: []float64{0.4, 1, 1.5, 2, 2.5, 3, 4, 5.5}, Meaning: "effective focus, d of the standards"},
	{Path: "source.tube.target", Kind: Name, Default: "W", Meaning: "metal of the target"},
	{Path: "source.tube.anodeDeg", Kind: Number, Unit: "deg", Min: 5, Max: 45, Step: 1, Usual: []float64{10, 15, 20, 22, 30}, Default: "20 deg",
		Meaning: "angle between the face of the anode and the central ray"},
	{Path: "source.tube.waveform", Kind: Name, Default: "constant", Meaning: "how the tube voltage runs; two-pulse and self-rectified give less at the same peak"},
	{Path: "source.tube.coneDeg", Kind: Number, Unit: "deg", Min: 5, Max: 360, Step: 5, Usual: []float64{20, 30, 35, 40, 60, 360}, Default: "40 deg",
		Meaning: "full opening of the useful beam; 360 for a panoramic head"},
	{Path: "source.tube.maxKV", Kind: Number, Unit: "kV", Min: 20, Max: 450, Step: 5, Usual: []float64{100, 160, 200, 225, 250, 300, 320, 450}, Default: "not stated",
		Meaning: "most that the head is rated for; kv must not exceed it"},
	{Path: "source.tube.maxW", Kind: Number, Unit: "W", Min: 1, Max: 50000, Step: 50, Usual: []float64{640, 750, 900, 1000, 1200, 1500, 3000, 4500}, Default: "not stated",
		Meaning: "most power that the head is rated for; kv x ma must not exceed it"},
	{Path: "source.tube.filters", Kind: List, Max: 20, Default: "none: the bare target, said in the answer",
		Meaning: "the whole filtration from the target outward: window, oil, added sheets"},
	{Path: "source.tube.filters[].material", Kind: Name, Required: true, Meaning: "catalogue name or element symbol"},
	{Path: "source.tube.filters[].mm", Kind: Number, Required: true, Unit: "mm", Min: 0, Max: 100, Step: 0.1, Usual: []float64{0, 0.5, 1, 2, 3, 4}, Meaning: "thickness"},
	{Path: "source.tube.leakageMGyPerHAt1m", Kind: Number, Unit: "mGy/h", Min: 0.001, Max: 100, Step: 0.1, Usual: []float64{1, 2.5, 5, 10},
		Default: "2.5 mGy/h up to 200 kV, 10 mGy/h above", Meaning: "air kerma rate at 1 m through the closed housing, from the certificate"},
}

var sealedFields = []Field{
	{Path: "source.sealed", Kind: Object, Default: "none", Meaning: "a sealed gamma source"},
	{Path: "source.sealed.nuclide", Kind: Name, Required: true, Meaning: "radionuclide"},
	{Path: "source.sealed.activityGBq", Kind: Number, Unit: "GBq", Min: 0.01, Max: 1e6, Step: 10, Usual: []float64{370, 740, 1110, 1480, 1850, 2960, 3700},
		Default: "from activityCi", Meaning: "activity at assayed; exactly one of activityGBq and activityCi"},
	{Path: "source.sealed.activityCi", Kind: Number, Unit: "Ci", Min: 0.0003, Max: 27000, Step: 1, Usual: []float64{10, 20, 30, 40, 50, 80, 100},
		Default: "from activityGBq", Meaning: "the same in curie, 1 Ci = 37 GBq"},
	{Path: "source.sealed.assayed", Kind: Time, Required: true, Min: 1950, Max: 2100, Meaning: "time for which the certificate gives the activity"},
	{Path: "source.sealed.sizeMM", Kind: Number, Required: true, Unit: "mm", Min: 0.1, Max: 15, Step: 0.1, Usual: []float64{1, 1.5, 2, 2.5, 3, 4}, Meaning: "largest effective dimension, d of the standards"},
	{Path: "source.sealed.basis", Kind: Name, Default: "output", Meaning: "what the certificate gives: output, the equivalent activity of what comes out; content, the activity inside"},
	{Path: "source.sealed.coneDeg", Kind: Number, Unit: "deg", Min: 5, Max: 360, Step: 5, Usual: []float64{30, 60, 90, 360}, Default: "360 deg, bare in all directions",
		Meaning: "full opening of the collimator"},
	{Path: "source.sealed.collimator", Kind: List, Max: 10, Default: "none: no shielding counted", Meaning: "walls of the collimator outside its opening, from the source outward"},
	{Path: "source.sealed.collimator[].material", Kind: Name, Required: true, Meaning: "catalogue name or element symbol"},
	{Path: "source.sealed.collimator[].mm", Kind: Number, Required: true, Unit: "mm", Min: 0, Max: 100, Step: 1, Usual: []float64{5, 10, 15, 20}, Meaning: "thickness"},
}

var partFields = []Field{
	{Path: "part", Kind: Object, Required: true, Meaning: "what stands between source and detector"},
	{Path: "part.layers", Kind: List, Required: true, Min: 1, Max: 20, Meaning: "what the central ray passes, from source to detector; both walls with the double-wall setups"},
	{Path: "part.layers[].material", Kind: Name, Required: true, Meaning: "catalogue name or element symbol"},
	{Path: "part.layers[].mm", Kind: Number, Required: true, Unit: "mm", Min: 0.01, Max: 2000, Step: 0.5,
		Usual: []float64{3, 5, 6, 8, 10, 12, 15, 20, 25, 30, 40, 50, 60, 80, 100}, Meaning: "thickness along the ray"},
	{Path: "part.sections", Kind: List, Max: 50, Default: "none", Meaning: "other thicknesses of the part on the same image: thin and thick places of a casting, a weld with its cap"},
	{Path: "part.sections[].name", Kind: Text, Required: true, Min: 1, Max: 60, Meaning: "what the place is called; no two alike"},
	{Path: "part.sections[].layers", Kind: List, Required: true, Min: 1, Max: 20, Meaning: "as part.layers"},
	{Path: "part.sections[].layers[].material", Kind: Name, Required: true, Meaning: "catalogue name or element symbol"},
	{Path: "part.sections[].layers[].mm", Kind: Number, Required: true, Unit: "mm", Min: 0.01, Max: 2000, Step: 0.5,
		Usual: []float64{3, 5, 6, 8, 10, 12, 15, 20, 25, 30, 40, 50, 60, 80, 100}, Meaning: "thickness along the ray"},
	{Path: "part.odMM", Kind: Number, Unit: "mm", Min: 2, Max: 20000, Step: 1, Usual: []float64{21.3, 26.7, 33.4, 42.2, 48.3, 60.3, 73, 88.9, 114.3, 141.3, 168.3, 219.1, 273, 323.9, 355.6, 406.4, 457, 508, 610},
		Default: "none; needed with the double-wall setups", Meaning: "outside diameter of a pipe, De of the standards"},
	{Path: "part.wallMM", Kind: Number, Unit: "mm", Min: 0.1, Max: 500, Step: 0.1, Usual: []float64{2.8, 3.2, 3.6, 3.9, 5.5, 6, 7.1, 8.2, 9.5, 12.7},
		Default: "none; needed with odMM", Meaning: "nominal wall of a pipe, t of the standards"},
	{Path: "part.weldMM", Kind: Number, Unit: "mm", Min: 0.5, Max: 500, Step: 1, Usual: []float64{6, 8, 10, 12, 15, 20, 25}, Default: "not stated: checks that need it stay undecided",
		Meaning: "width of the weld's cap"},
}

var setupFields = []Field{
	{Path: "setup", Kind: Object, Required: true, Meaning: "where source, part and detector stand"},
	{Path: "setup.kind", Kind: Name, Required: true, Meaning: "how the beam meets the part"},
	{Path: "setup.image", Kind: Name, Default: "elliptical with double-wall-double-image", Meaning: "how the two walls fall on the film; only with double-wall-double-image"},
	{Path: "setup.side", Kind: Name, Default: "outside with a single-wall pipe", Meaning: "where the source stands; only with single-wall and a pipe"},
	{Path: "setup.shots", Kind: Number, Min: 1, Max: 100, Step: 1, Usual: []float64{1, 2, 3, 4, 5, 6, 8, 10}, Default: "not stated: the number needed is told", Meaning: "shots planned round the weld; only with a pipe"},
	{Path: "setup.sfdMM", Kind: Number, Required: true, Unit: "mm", Min: 20, Max: 20000, Step: 10,
		Usual: []float64{200, 250, 300, 350, 400, 500, 600, 700, 800, 900, 1000, 1200, 1500, 2000}, Meaning: "source to film; more than the part and its distance from the film take"},
	{Path: "setup.bMM", Kind: Number, Unit: "mm", Min: 0.01, Max: 20000, Step: 1, Usual: []float64{5, 10, 20, 30, 50, 100},
		Default: "the part's total thickness: film touching the part",
		Meaning: "source-side surface of the part to the film; at least the part's total thickness. With the double-wall setups a value from odMM up runs across the whole pipe, one below odMM leaves the bore out"},
}

var detectorFields = []Field{
	{Path: "detector", Kind: Object, Required: true, Meaning: "exactly one of film, plate and panel"},
	{Path: "detector.film", Kind: Object, Default: "none", Meaning: "a film system"},
	{Path: "detector.film.class", Kind: Name, Required: true, Meaning: "class of ISO 11699-1; C1 is the finest"},
	{Path: "detector.film.density", Kind: Number, Required: true, Min: 1, Max: 4.5, Step: 0.1, Usual: []float64{1.8, 2, 2.3, 2.5, 3, 3.5, 4}, Meaning: "wanted optical density with base and fog"},
	{Path: "detector.film.screensMM", Kind: List, Min: 2, Max: 2, Default: "none", Meaning: "lead screens, front and back; 0 is none"},
	{Path: "detector.film.screensMM[]", Kind: Number, Unit: "mm", Min: 0, Max: 3, Step: 0.025, Usual: []float64{0, 0.025, 0.05, 0.1, 0.125, 0.15, 0.2, 0.25}, Meaning: "lead"},
	{Path: "detector.plate", Kind: Object, Default: "none", Meaning: "a phosphor imaging plate"},
	{Path: "detector.plate.snrN", Kind: Number, Required: true, Min: 20, Max: 1000, Step: 10, Usual: []float64{70, 100, 120, 140, 170}, Meaning: "wanted normalised signal-to-noise ratio"},
	{Path: "detector.plate.pixelUM", Kind: Number, Required: true, Unit: "um", Min: 10, Max: 400, Step: 5, Usual: []float64{25, 50, 100}, Meaning: "scanning pitch"},
	{Path: "detector.plate.srbUM", Kind: Number, Unit: "um", Min: 10, Max: 1000, Step: 5, Usual: []float64{40, 50, 63, 80, 100, 130, 160}, Default: "not stated: checks that need it stay undecided",
		Meaning: "basic spatial resolution of plate and scanner"},
	{Path: "detector.plate.screensMM", Kind: List, Min: 2, Max: 2, Default: "none", Meaning: "lead screens, front and back; 0 is none"},
	{Path: "detector.plate.screensMM[]", Kind: Number, Unit: "mm", Min: 0, Max: 3, Step: 0.025, Usual: []float64{0, 0.05, 0.1, 0.15, 0.2}, Meaning: "lead"},
	{Path: "detector.panel", Kind: Object, Default: "none", Meaning: "a flat panel detector"},
	{Path: "detector.panel.snrN", Kind: Number, Required: true, Min: 20, Max: 5000, Step: 10, Usual: []float64{70, 100, 120, 140, 170, 250, 500}, Meaning: "wanted normalised signal-to-noise ratio"},
	{Path: "detector.panel.pixelUM", Kind: Number, Required: true, Unit: "um", Min: 10, Max: 400, Step: 5, Usual: []float64{50, 100, 127, 150, 200}, Meaning: "pitch"},
	{Path: "detector.panel.srbUM", Kind: Number, Unit: "um", Min: 10, Max: 1000, Step: 5, Usual: []float64{50, 63, 80, 100, 130, 160, 200}, Default: "not stated: checks that need it stay undecided",
		Meaning: "basic spatial resolution of the panel"},
	{Path: "rules", Kind: Name, Default: "none: no checks", Meaning: "rule set that the plan is checked against"},
}

var siteFields = []Field{
	{Path: "site", Kind: Object, Default: "none", Meaning: "the boundary's part of the plan"},
	{Path: "site.limits", Kind: List, Max: 20, Default: "none: no boundary is computed", Meaning: "criteria for the rope; the outermost distance wins"},
	{Path: "site.limits[].name", Kind: Text, Required: true, Min: 1, Max: 60, Meaning: "what the limit is called; no two alike"},
	{Path: "site.limits[].rateUSvPerH", Kind: Number, Unit: "uSv/h", Min: 0.01, Max: 1e6, Step: 0.5, Usual: []float64{0.5, 1, 2.5, 7.5, 10, 20, 25, 40}, Default: "none: a dose limit",
		Meaning: "H*(10) rate; with averagingMin"},
	{Path: "site.limits[].averagingMin", Kind: Number, Unit: "min", Min: 0.01, Max: 60, Step: 1, Usual: []float64{1}, Default: "none; needed with rateUSvPerH",
		Meaning: "the meter's smoothing; beam-off time is never averaged in"},
	{Path: "site.limits[].doseUSv", Kind: Number, Unit: "uSv", Min: 0.01, Max: 1e7, Step: 1, Usual: []float64{2.5, 20, 50, 100, 300, 1000}, Default: "none: a rate limit",
		Meaning: "H*(10) dose in the period; with per"},
	{Path: "site.limits[].per", Kind: Name, Default: "none; needed with doseUSv", Meaning: "period of the dose"},
	{Path: "site.limits[].occupancy", Kind: Number, Min: 0.001, Max: 1, Step: 0.05, Usual: []float64{0.05, 0.1, 0.25, 0.5, 1}, Default: "1 with doseUSv",
		Meaning: "share of the period that somebody is there; only with doseUSv"},
	{Path: "site.shotsPerHour", Kind: Number, Min: 0.01, Max: 600, Step: 1, Usual: []float64{1, 2, 4, 6, 8, 10, 12, 20}, Default: "not stated: the beam is on all hour",
		Meaning: "shots in an hour, the most of any hour"},
}
