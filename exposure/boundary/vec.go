package boundary

import "math"

// Vec is a place on the site in metres: X east, Y north, Z above the ground.
type Vec struct{ X, Y, Z float64 }

func (v Vec) plus(w Vec) Vec         { return Vec{v.X + w.X, v.Y + w.Y, v.Z + w.Z} }
func (v Vec) minus(w Vec) Vec        { return Vec{v.X - w.X, v.Y - w.Y, v.Z - w.Z} }
func (v Vec) times(s float64) Vec    { return Vec{v.X * s, v.Y * s, v.Z * s} }
func (v Vec) dot(w Vec) float64      { return v.X*w.X + v.Y*w.Y + v.Z*w.Z }
func (v Vec) length() float64        { return math.Sqrt(v.dot(v)) }
func (v Vec) unit() Vec              { return v.times(1 / v.length()) }
func (v Vec) distance(w Vec) float64 { return v.minus(w).length() }
func cosDeg(deg float64) float64     { return math.Cos(deg * math.Pi / 180) }
func sinDeg(deg float64) float64     { return math.Sin(deg * math.Pi / 180) }
func acosDeg(c float64) float64      { return math.Acos(max(-1, min(1, c))) * 180 / math.Pi }

// angles is how many nodes a table by scattering angle has: evenly in the sine
// of half the angle, which costs a root instead of an arc.
const angles = 241

// nodeDeg is the angle of a node.
func nodeDeg(i int) float64 { return 2 * math.Asin(float64(i)/(angles-1)) * 180 / math.Pi }

// byCos reads a table by angle at the angle's cosine.
func byCos(t *[angles]float64, cos float64) float64 {
	x := math.Sqrt(max(0, 1-cos)/2) * (angles - 1)
	i := min(int(x), angles-2)
	return t[i] + (t[i+1]-t[i])*(x-float64(i))
}

func inTable(t []float64, deg float64) float64 {
	i := min(int(deg), len(t)-2)
	return t[i] + (t[i+1]-t[i])*(deg-float64(i))
}

// direction gives the unit vector of a bearing from north and an elevation.
func direction(bearingDeg, elevationDeg float64) Vec {
	c := cosDeg(elevationDeg)
	return Vec{sinDeg(bearingDeg) * c, cosDeg(bearingDeg) * c, sinDeg(elevationDeg)}
}

// frame gives two unit vectors at right angles to axis: right is level.
func frame(axis Vec, bearingDeg float64) (right, up Vec) {
	right = Vec{cosDeg(bearingDeg), -sinDeg(bearingDeg), 0}
	up = Vec{right.Y*axis.Z - right.Z*axis.Y, right.Z*axis.X - right.X*axis.Z, right.X*axis.Y - right.Y*axis.X}
	return right, up
}
