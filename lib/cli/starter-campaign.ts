/** What `new` writes: a small campaign that can be predicted as it stands, each part explained by a `note` beside it.
 *  JSON has no comments; a note may stand on any object and is kept. The places and numbers are invented. */
export const starterCampaign = `{
  "format": "plumbtick-campaign/1",
  "note": "Two invented places and a fibre between them. Change the numbers, then: plumbtick check FILE, plumbtick predict FILE. A number in brackets is the standard uncertainty of the last digits: 143.216(8) m is 143.216 m with u = 8 mm.",
  "title": "My first campaign",
  "tide": "mean",
  "target": "1 cm",
  "sources": [
    {
      "id": "gnss",
      "correlation": 0.3,
      "note": "What two GNSS heights have in common. Inputs that name the same source are correlated; all others are not."
    },
    {
      "id": "quasigeoid",
      "correlationLength": "80 km",
      "note": "Errors of the quasigeoid model are alike at near places: the correlation falls as exp(-distance/80 km)."
    }
  ],
  "sites": [
    {
      "id": "cellar",
      "name": "Cellar, marker on the floor",
      "note": "The site is the marker. lat north and lon east are positive, in degrees.",
      "lat": 52.2961,
      "lon": 10.4598,
      "h": {
        "value": "143.216(8) m",
        "tide": "free",
        "source": "gnss",
        "note": "Height over the ellipsoid. GNSS heights are free of the permanent tide unless somebody has added it."
      },
      "g": "9.8125523(30) m/s²",
      "determinations": [
        {
          "kind": "gnss-quasigeoid",
          "zeta": {
            "value": "43.812(19) m",
            "tide": "zero",
            "source": "quasigeoid",
            "note": "Height anomaly from the model. Without a datum its W0 is the IHRS value."
          }
        }
      ]
    },
    {
      "id": "observatory",
      "name": "Observatory, bolt at the pier",
      "lat": 50.91,
      "lon": 11.72,
      "h": { "value": "384.907(9) m", "tide": "free", "source": "gnss" },
      "g": "9.8103540(40) m/s²",
      "determinations": [
        {
          "kind": "gnss-quasigeoid",
          "zeta": { "value": "45.733(20) m", "tide": "zero", "source": "quasigeoid" }
        }
      ]
    }
  ],
  "clocks": [
    {
      "id": "sr-1",
      "site": "cellar",
      "transition": "87Sr",
      "tie": [
        { "name": "marker to table", "dH": "1.2034(5) m", "note": "Height of the upper end over the lower. Down is negative." },
        { "name": "table to atoms", "dH": "0.312(1) m" }
      ],
      "systematic": "1.9e-18",
      "stability": { "white": "1.5e-16", "flicker": "1e-18" },
      "uptime": 0.7,
      "note": "systematic and stability are not needed to predict; they are for planning and for comparing with a measurement."
    },
    {
      "id": "sr-2",
      "site": "observatory",
      "transition": "87Sr",
      "tie": [{ "name": "bolt to atoms", "dH": "0.942(2) m" }],
      "systematic": "2.4e-18",
      "stability": { "white": "2e-16" },
      "uptime": 0.6
    }
  ],
  "links": [
    {
      "id": "fibre",
      "from": "sr-1",
      "to": "sr-2",
      "kind": "fibre",
      "length": "240 km",
      "note": "y is the offset of the to clock seen from the from clock: positive when the to clock is higher and runs fast."
    }
  ]
}
`;
