package fluid

// fuels are typical of their standards; only the limits are stated there.
func fuels() []Fluid {
	fuel := func(key, name string, low, high float64, m mineral, s Sources) Fluid {
		return Fluid{Key: key, Name: name, Category: "fuel", Low: freezing + low, High: freezing + high, Sources: s,
			Note: "typical; the standard states limits alone", at: m.at}
	}
	return []Fluid{
		fuel("diesel", "diesel fuel EN 590, temperate", -10, 60,
			mineral{
				law:     through(freezing+20, 4.2, freezing+40, 2.8),
				density: sloping{831.5, freezing + 20, 0.7},
				bulk:    sloping{1.538e9, freezing + 20, 8e6},
			}, Sources{
				Density:     Source{Common, "831.5 kg/m³ at 20 °C falling by 0.7 kg/m³ each kelvin (EN 590: 820 to 845 kg/m³ at 15 °C)"},
				Viscosity:   Source{Common, "Walther's law (ASTM D341) through 4.2 mm²/s at 20 °C and 2.8 mm²/s at 40 °C (EN 590: 2.0 to 4.5 mm²/s at 40 °C)"},
				BulkModulus: Source{Common, "ρ·w² with a speed of sound of 1360 m/s at 20 °C, falling by 8 MPa/K"},
			}),
		fuel("fuel oil light", "light fuel oil for heating", -10, 60,
			mineral{
				law:     through(freezing+20, 5.0, freezing+40, 3.1),
				density: sloping{845, freezing + 15, 0.7},
				bulk:    sloping{1.55e9, freezing + 20, 8e6},
			}, Sources{
				Density:     Source{Common, "845 kg/m³ at 15 °C falling by 0.7 kg/m³ each kelvin (DIN 51603-1: at most 860 kg/m³)"},
				Viscosity:   Source{Common, "Walther's law (ASTM D341) through 5.0 mm²/s at 20 °C (DIN 51603-1: at most 6) and 3.1 mm²/s at 40 °C"},
				BulkModulus: Source{Common, "1.55 GPa at 20 °C falling by 8 MPa/K"},
			}),
		fuel("fuel oil 180", "heavy fuel oil of 180 mm²/s at 50 °C", 20, 130,
			mineral{
				law:     through(freezing+50, 180, freezing+100, 25),
				density: sloping{970, freezing + 15, 0.65},
				bulk:    sloping{1.9e9, freezing + 20, 6e6},
			}, Sources{
				Density:     Source{Common, "970 kg/m³ at 15 °C falling by 0.65 kg/m³ each kelvin (ISO 8217: at most 991)"},
				Viscosity:   Source{Common, "Walther's law (ASTM D341) through 180 mm²/s at 50 °C and 25 mm²/s at 100 °C (RME 25 of ISO 8217:1996)"},
				BulkModulus: Source{Common, "1.9 GPa at 20 °C falling by 6 MPa/K"},
			}),
		fuel("fuel oil 380", "heavy fuel oil of 380 mm²/s at 50 °C", 20, 130,
			mineral{
				law:     through(freezing+50, 380, freezing+100, 35),
				density: sloping{980, freezing + 15, 0.65},
				bulk:    sloping{1.9e9, freezing + 20, 6e6},
			}, Sources{
				Density:     Source{Common, "980 kg/m³ at 15 °C falling by 0.65 kg/m³ each kelvin (ISO 8217: at most 991)"},
				Viscosity:   Source{Common, "Walther's law (ASTM D341) through 380 mm²/s at 50 °C and 35 mm²/s at 100 °C (RMG 35 of ISO 8217:1996)"},
				BulkModulus: Source{Common, "1.9 GPa at 20 °C falling by 6 MPa/K"},
			}),
	}
}
