package catalogue

// profileI makes a rolled I or H section with parallel flanges and root radii.
//
// Shear areas for resistance: A − 2·b·tf + (tw + 2·r)·tf along the web
// (EN 1993-1-1, 6.2.6(3)a), not less than the web's hw·tw, and both flanges,
// 2·b·tf, across it (common practice). Warping constant b³·tf·(h − tf)²/24, that
// of the flanges without fillets, as the European tables have it.
func (s *Section) profileI(h, b, tw, tf, r float64) {
	y, z, web, inside := b/2, h/2, tw/2, h/2-tf
	s.finish(outline{[][]piece{loop(
		corner{-y, -z, 0}, corner{y, -z, 0}, corner{y, -inside, 0}, corner{web, -inside, r},
		corner{web, inside, r}, corner{y, inside, 0}, corner{y, z, 0}, corner{-y, z, 0},
		corner{-y, inside, 0}, corner{-web, inside, r}, corner{-web, -inside, r}, corner{-y, -inside, 0},
	)}})
	s.It = torsionI(h, b, tw, tf, r)
	s.Iw = cube(b) * tf * (h - tf) * (h - tf) / 24
	s.Avz = max(s.A-2*b*tf+(tw+2*r)*tf, (h-2*tf)*tw)
	s.Avy = 2 * b * tf
}
