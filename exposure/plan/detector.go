package plan

// Plate is a phosphor imaging plate read by a scanner.
type Plate struct {
	SNRn      float64     `json:"snrN"`                // wanted normalised signal-to-noise ratio, 20 to 1000
	PixelUM   float64     `json:"pixelUM"`             // scanning pitch, 10 to 400 um
	SRbUM     float64     `json:"srbUM,omitzero"`      // basic spatial resolution of the detector; default: not stated, then checks that need it stay undecided
	ScreensMM *[2]float64 `json:"screensMM,omitempty"` // lead screens front and back, mm
}

// Panel is a flat panel detector.
type Panel struct {
	SNRn    float64 `json:"snrN"`           // wanted normalised signal-to-noise ratio, 20 to 5000
	PixelUM float64 `json:"pixelUM"`        // pitch, 10 to 400 um
	SRbUM   float64 `json:"srbUM,omitzero"` // basic spatial resolution; default: the pitch is not taken for it, undecided
}
