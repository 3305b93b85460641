package catalogue

import "math"

// torsionRectangle is St Venant's series for a solid rectangle (Timoshenko and
// Goodier, Theory of Elasticity, article on torsion of rectangular bars):
//
//	It = b·a³·(1/3 − 64/π⁵·(a/b)·Σ tanh(nπb/2a)/n⁵), n = 1, 3, 5 …
//
// with a the short and b the long side.
func torsionRectangle(one, other float64) float64 {
	a, b := min(one, other), max(one, other)
	var sum float64
	for n := 199.0; n >= 1; n -= 2 { // small terms first; the rest is below 1e-10 of the sum
		sum += math.Tanh(n*math.Pi*b/(2*a)) / (n * n * n * n * n)
	}
	return b * a * a * a * (1.0/3 - 64/(math.Pi*math.Pi*math.Pi*math.Pi*math.Pi)*a/b*sum)
}

// torsionBox is that of EN 10210-2 and EN 10219-2 for rectangular tubes, with
// the mean corner radius Rc: Bredt's tube along the middle of the wall, and what
// the wall carries by itself.
//
//	It = t³·p/3 + 4·Ah²·t/p
//	p  = 2·((b − t) + (h − t)) − 2·Rc·(4 − π)
//	Ah = (b − t)·(h − t) − Rc²·(4 − π)
func torsionBox(depth, width, wall, meanRadius float64) float64 {
	round := 4 - math.Pi
	perimeter := 2*(width-wall+depth-wall) - 2*meanRadius*round
	enclosed := (width-wall)*(depth-wall) - meanRadius*meanRadius*round
	return wall*wall*wall*perimeter/3 + 4*enclosed*enclosed*wall/perimeter
}

// torsionI is the formula behind the European tables of I sections with
// parallel flanges (EN 10365 product tables):
//
//	It = 2/3·(b − 0.63·tf)·tf³ + 1/3·(h − 2·tf)·tw³ + 2·(tw/tf)·(0.145 + 0.1·r/tf)·D⁴
//	D  = ((r + tw/2)² + (r + tf)² − r²)/(2·r + tf)
//
// D is the diameter of the circle that touches the fillets and the flange's
// face.
func torsionI(h, b, tw, tf, r float64) float64 {
	d := ((tf+r)*(tf+r) + (r+tw/4)*tw) / (2*r + tf)
	return 2.0/3*(b-0.63*tf)*cube(tf) + (h-2*tf)*cube(tw)/3 + 2*tw/tf*(0.145+0.1*r/tf)*cube(d)*d
}

// torsionJunctionI is the formula of El Darwish and Johnston (Torsion of
// structural shapes, Journal of the Structural Division, ASCE 91, 1965), which
// British and American tables of I sections follow:
//
//	It = 2/3·b·tf³ + 1/3·(h − 2·tf)·tw³ + 2·α·D⁴ − 0.420·tf⁴
//	α  = −0.042 + 0.2204·tw/tf + 0.1355·r/tf − 0.0865·r·tw/tf² − 0.0725·(tw/tf)²
func torsionJunctionI(h, b, tw, tf, r float64) float64 {
	d := ((tf+r)*(tf+r) + (r+tw/4)*tw) / (2*r + tf)
	web, root := tw/tf, r/tf
	alpha := -0.042 + 0.2204*web + 0.1355*root - 0.0865*root*web - 0.0725*web*web
	return 2.0/3*b*cube(tf) + (h-2*tf)*cube(tw)/3 + 2*alpha*cube(d)*d - 0.420*cube(tf)*tf
}

// torsionChannel is the formula of El Darwish and Johnston for channels:
//
//	It = 2/3·b·tf³ + 1/3·(h − 2·tf)·tw³ + 2·α·D⁴ − 0.420·tf⁴
//	α  = −0.0908 + 0.2621·tw/tf + 0.1231·r/tf − 0.0752·r·tw/tf² − 0.0945·(tw/tf)²
//	D  = 2·(3r + tw + tf − √(2·(2r + tw)·(2r + tf)))
func torsionChannel(h, b, tw, tf, r float64) float64 {
	d := 2 * (3*r + tw + tf - math.Sqrt(2*(2*r+tw)*(2*r+tf)))
	web, root := tw/tf, r/tf
	alpha := -0.0908 + 0.2621*web + 0.1231*root - 0.0752*root*web - 0.0945*web*web
	return 2.0/3*b*cube(tf) + (h-2*tf)*cube(tw)/3 + 2*alpha*cube(d)*d - 0.420*cube(tf)*tf
}

// torsionAngle is the formula of El Darwish and Johnston for angles:
//
//	It = 1/3·b·t³ + 1/3·(h − t)·t³ + α·D⁴ − 0.21·t⁴
//	α  = 0.0768 + 0.0479·r/t
//	D  = 2·(3r + 2t − √2·(2r + t))
//
// The last term takes off the free ends of the two legs.
func torsionAngle(h, b, t, r float64) float64 {
	d := 2 * (3*r + 2*t - math.Sqrt2*(2*r+t))
	return (b+h-t)*cube(t)/3 + (0.0768+0.0479*r/t)*cube(d)*d - 0.21*cube(t)*t
}

func cube(x float64) float64 { return x * x * x }
