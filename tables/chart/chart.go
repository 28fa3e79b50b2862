package chart

// Line is a curve through points whose X rise.
type Line struct {
	Name string
	X, Y []float64
}

// Band is the area between two curves over the same X, which rise.
type Band struct {
	Name         string
	X, Low, High []float64
}

// Level is a horizontal line.
type Level struct {
	Name string
	Y    float64
}

// Flag is an event on the X axis: an addition, a racking.
type Flag struct {
	X    float64
	Text string
}

// Mark is a reading: U is the half-width of its uncertainty in the unit of Y, 0 for
// no bar; a hollow mark does not count.
type Mark struct {
	X, Y, U float64
	Hollow  bool
}

// Course is what was read in the course of time, and what is thought of it. Labels
// of the axes carry their units. What is nil, or has no points, is not drawn; without
// marks the picture says that there are no readings.
type Course struct {
	Title, XLabel, YLabel string

	Marks    []Mark // in any order
	Fitted   *Line
	Forecast *Band
	Median   *Line // of the forecast; not labelled where the name of the band begins with its own
	Limit    *Level
	Flags    []Flag // in any order; see [Course.Numbered]
	Envelope *Band  // behind everything: what others did

	YPlaces int // decimals of the Y axis at least; 0 for as many as the values need
}

// Individual is one value in an order.
type Individual struct {
	Label   string // its name on the X axis; empty for its number
	Y       float64
	Group   int  // chooses the shape of its marker; 0 is not known
	Flagged bool // ringed, and named where there is room
}

// Control shows individual values in order, with the limits they are held against.
// Warning and action limits lie around the centre in this order; they are drawn with
// HasLimits only.
type Control struct {
	Title, XLabel, YLabel string

	Points                  []Individual
	Centre                  float64
	WarningLow, WarningHigh float64
	ActionLow, ActionHigh   float64
	HasLimits               bool

	GroupName string // what a group is, for the legend; empty for "generation"
	YPlaces   int    // decimals of the Y axis at least; 0 for as many as the values need
}
