package job

import "math"

// defaults are what links take that don't say otherwise.
type defaults struct {
	stock      string
	stockAsked bool // stated, or the only one there is
	width      float64
	fillet     float64
	rim        float64
}

func (r *reader) defaults(v *value) defaults {
	d := v.get("defaults")
	out := defaults{
		width:  d.get("width").numberOr(0),
		fillet: d.get("fillet").numberOr(0),
		rim:    d.get("rim").numberOr(0),
	}
	stocks := v.get("stock").all()
	switch {
	case d.has("stock"):
		var names []string
		for _, e := range stocks {
			names = append(names, e.name)
		}
		out.stock, out.stockAsked = r.known(d.get("stock"), names, "stock", "defaults"), true
	case d != nil && !d.isWhole():
		out.stockAsked = true // it may be in what could not be read
	case len(stocks) == 1:
		out.stock, out.stockAsked = stocks[0].name, true
	}
	return out
}

// stocks reads the sheets on the shelf.
func (r *reader) stocks(v *value) []Stock {
	var out []Stock
	for _, e := range v.all() {
		s := e.value
		t := s.get("thickness").numberOr(0)
		st := Stock{
			Name:      e.name,
			Material:  r.material(s.get("material")),
			Thickness: t,
			Measured:  s.get("measured").numberOr(t),
			Quantity:  int(s.get("quantity").numberOr(1)),
			Margin:    s.get("margin").numberOr(0),
			Web:       s.get("web").numberOr(t),
			Kerf:      s.get("kerf").numberOr(0),
			ByShop:    s.get("compensated-by").textOr("pinwright") == "shop",
			Grain:     Grain(s.get("grain").textOr(usualGrain(s.get("material")))),
			Price:     s.get("price").numberOr(0),
		}
		if m := s.get("measured"); m.ok() && s.get("thickness").ok() {
			// ISO 7823-1 allows cast sheet +-(0.4 + 0.1 t), the widest of the usual sheets.
			if far := 0.4 + 0.1*t; math.Abs(m.number-t) > far+1e-9 {
				r.fail(m.at, "measure again; if it is right, it is a sheet of another nominal thickness",
					"measured: %s mm is %s mm off the nominal %s mm; a sheet may be %s mm off", figure(m.number), figure(math.Abs(m.number-t)), figure(t), figure(far))
			}
		}
		if k := s.get("kerf"); k.ok() && k.number == 0 && !st.ByShop {
			r.fail(k.at, kerfAdvice, "kerf: a beam that takes nothing away does not cut")
		}
		if sides := s.get("sheet").each(); len(sides) == 2 && sides[0].ok() && sides[1].ok() {
			st.Width, st.Height = sides[0].number, sides[1].number
			if least := math.Min(st.Width, st.Height); least <= 2*st.Margin {
				r.fail(s.get("sheet").at, "make the margin smaller, or the sheet larger",
					"sheet: %s mm less two margins of %s mm leaves no room", figure(least), figure(st.Margin))
			}
		}
		out = append(out, st)
	}
	return out
}

func stockNames(stock []Stock) []string {
	names := make([]string, len(stock))
	for i, s := range stock {
		names[i] = s.Name
	}
	return names
}

// stockName is the stock that a thing is cut from: its own, or the default.
func (r *reader) stockName(v *value, where string, at spot, d defaults, stock []Stock) string {
	if v != nil {
		return r.known(v, stockNames(stock), "stock", where)
	}
	if !d.stockAsked && len(stock) > 0 {
		r.noStock = append(r.noStock, where)
		if len(r.noStock) == 1 {
			r.noStockAt = at
		}
	}
	return d.stock
}

// tellNoStock reports, once, what has no stock.
func (r *reader) tellNoStock(stock []Stock) {
	if len(r.noStock) == 0 {
		return
	}
	verb := "have"
	if len(r.noStock) == 1 {
		verb = "has"
	}
	r.fail(r.noStockAt, "write defaults: {stock: "+stock[0].Name+"}, or stock: "+stock[0].Name+" there", "%s %s no stock", allOf(r.noStock), verb)
}
