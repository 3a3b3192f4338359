/** A campaign in which every key that is read stands somewhere, in as many forms as fit. Invented. */
export const EVERYTHING = `{
  "format": "plumbtick-campaign/1", "title": "Every key", "note": "n0", "reference": "r0", "date": "d0", "tide": "free",
  "window": { "start": "2027-05-03T00:00:00.5Z", "end": 61600, "note": "n1" }, "target": 0.01, "effect": "20 cm",
  "love": { "k2": 0.3, "note": "n2" },
  "sources": [{ "id": "s", "name": "S", "correlation": 0 }, { "id": "t", "correlationLength": "80 km", "date": "d1" }, { "id": "u" }],
  "datums": [{ "id": "d", "name": "D", "W0": { "value": "62636853.4(5) m²/s²", "tide": "zero", "note": "n3" },
    "origin": { "lat": -33.3, "lon": "151°12'00\\"E", "note": "n4" }, "estimateOffset": true, "estimateTilt": true }],
  "transitions": [{ "id": "87Sr", "offset": { "value": 0, "u": 1e-18, "distribution": "t", "dof": 4 } }, { "id": "x", "frequency": "4.1e14 Hz" }],
  "sites": [
    { "id": "a", "name": "A", "lat": -1e-7, "lon": 359.9999999, "g": { "value": 979, "u": 2, "unit": "Gal" }, "gradient": "3084(9) E",
      "variable": "0.00(8) m²/s²", "candidate": true, "cost": 0,
      "h": { "value": "143.216 m", "parts": [{ "u": "3 mm", "source": "s", "note": "n5" }, { "u": 0 }, { "u": "4 mm" }], "tide": "mean" },
      "determinations": [
        { "kind": "potential", "W": 62636000, "use": "check", "note": "n6" },
        { "kind": "geopotential-number", "C": "14.03(3) gpu", "datum": "tt", "candidate": true, "cost": 3 },
        { "kind": "normal-height", "H": { "value": 143216, "unit": "mm" } },
        { "kind": "orthometric-height", "H": "143.2(1) m", "g": { "value": "9.8 m/s²", "u": "3 mGal" }, "datum": "d" },
        { "kind": "dynamic-height", "H": "143.2(1) m", "gammaRef": 9.806199 },
        { "kind": "gnss-quasigeoid", "zeta": { "value": "43.812", "u": 19, "unit": "mm", "source": "t" } },
        { "kind": "gnss-geoid", "h": "143.2", "N": "43(1) m", "meanGravityFactor": "4.2(4)e-7 s⁻²", "datum": "u0-grs80" },
        { "kind": "levelled-from", "site": "b", "dH": "-3.2 m", "length": "12 km", "b": "1 mm/√km", "k": { "value": "0.1 mm/km", "source": "u" } }] },
    { "id": "b", "lat": "52°17'41.2\\"N", "lon": -179.123456789 }],
  "clocks": [
    { "id": "k", "site": "a", "transition": "87Sr", "tie": [{ "name": "up", "dH": "1.2(1) m", "note": "n7" }, { "dH": -2 }],
      "systematic": [{ "u": "1.2e-18", "source": "u", "dof": 7, "name": "bbr", "note": "n8" }, { "u": 0 }, { "u": 3e-19 }],
      "stability": { "white": 2e-16, "note": "n9" }, "available": [{ "start": 61530, "end": "2027-05-09T12:00:00+02:00" }, { "start": 61528, "end": "61529.25" }] },
    { "id": "l", "site": "b", "transition": "x", "systematic": { "u": "2e-18", "source": "u" }, "stability": {}, "uptime": 0,
      "flywheel": { "stability": { "white": 1e-13, "flicker": "2e-15", "randomWalk": 1e-19, "phase": 2e-13, "note": "n9" }, "driftPerDay": 1e-17, "cycle": "1 d" } }],
  "links": [{ "id": "kl", "name": "KL", "from": "k", "to": "l", "kind": "own word", "length": 0, "segments": 3, "systematic": "3e-19",
    "stability": { "white": 0, "flicker": "1e-20", "phase": "1e-15" }, "uptime": { "value": 0.5 } },
    { "id": "lk", "from": "l", "to": "k", "kind": "transported", "fibre": { "noise": 13.7, "bandwidth": "10 Hz", "carrier": "195 THz", "groupIndex": 1.45 },
      "transported": { "clock": "l", "reproducibility": "2e-18", "reference": "r1", "sideBySide": [
        { "when": "before", "y": "1.2(3)e-17", "dH": "0.42(1) m", "systematic": [{ "u": 1e-18, "source": "u" }], "start": 61520, "end": 61521 },
        { "when": "after", "time": "2 d", "dH": 0.4 }] } }],
  "methods": { "levelling": { "b": "1.5 mm/√km", "k": "0.1 mm/km", "detour": 1.3, "note": "r2" }, "gnss": { "h": "7 mm", "geoid": 0.017, "correlationLength": "60 km" } },
  "measurements": [{ "id": "m", "link": "kl", "y": { "value": "2.1(2)e-14", "tide": "zero" }, "start": 61528, "end": 61530, "note": "n10" },
    { "id": "n", "link": "kl", "y": "2.2(2)e-14", "tide": "free", "includesSystematic": true, "use": "check" }, { "link": "kl", "y": 2e-14 }],
  "correlations": [{ "between": ["m", "n"], "rho": -0.41, "note": "n11" }]
}`;
