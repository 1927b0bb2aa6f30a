//! A worksheet of realistic length in an invented foundry; every number in it is
//! made up for its looks alone.

use farglow::drawing::curve::{self, Crossing, Curve, InverseSquare, LimitLine, Marker};
use farglow::drawing::mark::Shape;
use farglow::drawing::picture::Picture;
use farglow::worksheet::Error;
use farglow::worksheet::attach;
use farglow::worksheet::block::{Block, Cell, Column, Pair, Run, Signature, Table};
use farglow::worksheet::layout::{self, Furniture, Paper};
use farglow::worksheet::paint::{self, Meta};

/// The notebook that is attached.
pub const NOTEBOOK: &str =
    "{ \"farglow\": 1, \"title\": \"Charging door, furnace 2\", \"cells\": [] }\n";

pub fn furniture(draft: bool) -> Furniture {
    Furniture {
        title: "Charging door, furnace 2".into(),
        site: "Fernhill Castings, melting bay".into(),
        revision: "revision B".into(),
        digest: "notebook sha256:6b1f0a94c8e2d7530f4b9ad11c27e6853d90ab42f7715ce06e88d2349ba1c05f"
            .into(),
        program:
            "farglow 0.1.0 · planning aid; local law, measurement and licensed practice decide"
                .into(),
        draft: draft.then(|| {
            "2 limits are known by recall and not confirmed; hearth temperature unconfirmed".into()
        }),
    }
}

pub fn plot() -> Picture {
    let value =
        |distance: f64| 57_800.0 * 0.63 / (std::f64::consts::PI * distance * distance + 0.63);
    let rows: Vec<(f64, f64)> = (0..60)
        .map(|i| {
            let distance = 0.5 * 40_f64.powf(f64::from(i) / 59.0);
            (distance, value(distance))
        })
        .collect();
    let limit = |label: &str, value: f64, nominal: f64, upper: f64| LimitLine {
        label: label.into(),
        value,
        crossing: Some(Crossing {
            distance: nominal,
            text: format!("{nominal:.1} m"),
        }),
        upper_crossing: Some(Crossing {
            distance: upper,
            text: format!("{upper:.1} m"),
        }),
    };
    let curve = Curve {
        band: farglow::notebook::cell::position::Band::NearInfrared,
        title: "door: near-infrared irradiance at the eye, straight out, 1.60 m above the floor"
            .into(),
        x_label: "distance from the face of the door (m)".into(),
        y_label: "near-infrared irradiance, facing strongest (kW/m²)".into(),
        x_unit: 1.0,
        y_unit: 1000.0,
        upper: Some(rows.iter().map(|(d, v)| (*d, v * 1.11)).collect()),
        inverse_square: Some(InverseSquare {
            distance: 2.5,
            value: value(2.5),
            from: "charger, 2.50 m".into(),
        }),
        limits: vec![
            limit("eye, 4 min", 295.0, 6.2, 6.6),
            limit("eye, all shift", 100.0, 10.8, 11.4),
            limit("eye, 30 s", 1404.0, 2.9, 3.0),
        ],
        positions: vec![
            Marker {
                cell: "charger".into(),
                label: "charger · over".into(),
                distance: 2.5,
                value: value(2.5),
                shape: Shape::Over,
            },
            Marker {
                cell: "crane_hand".into(),
                label: "crane hand · not assessed".into(),
                distance: 8.2,
                value: value(8.2),
                shape: Shape::NotAssessed,
            },
            Marker {
                cell: "control_desk".into(),
                label: "control desk · within".into(),
                distance: 14.0,
                value: value(14.0),
                shape: Shape::Within,
            },
        ],
        screens: Vec::new(),
        shadows: Vec::new(),
        number: |value| value.to_string(),
        rows,
    };
    curve::picture(&curve, 493.0, 280.0)
}

pub fn blocks() -> Vec<Block> {
    let pair = |name: &str, value: &str| Pair::new(name, value);
    let mut blocks = vec![
        Block::Title {
            text: "Charging door, furnace 2".into(),
            under: "Heat radiation worksheet: where people may stand, for how long, and by whose guidance".into(),
        },
        Block::Pairs {
            columns: 3,
            pairs: vec![
                pair("site", "Fernhill Castings"),
                pair("area", "melting bay, east wall"),
                pair("task", "charging with the door open"),
                pair("prepared by", "M. Okafor"),
                pair("checked by", ""),
                pair("date", "2026-12-01"),
                pair("notebook", "charging-door.farglow, attached to this file"),
                pair("revision", "B"),
                pair("readiness", "2 points left before issue"),
            ],
        },
        Block::Heading("Findings".into()),
        Block::Finding {
            shape: Shape::Over,
            word: "over".into(),
            text: vec![
                Run::bold("charger"),
                Run::plain(" at 2.5 m: planned 4 min, the eye limit is reached after 34 s on the unfavourable bound (nominal 41 s)."),
            ],
        },
        Block::Finding {
            shape: Shape::NotAssessed,
            word: "not assessed".into(),
            text: vec![
                Run::bold("crane hand"),
                Run::plain(" at 8.2 m: heat strain needs humidity and air speed, which this notebook does not state."),
            ],
        },
        Block::Finding {
            shape: Shape::Within,
            word: "within (cornea and lens)".into(),
            text: vec![Run::bold("control desk"), Run::plain(" at 14.0 m, without limit of time.")],
        },
        Block::Caution(vec![
            vec![Run::bold("Planning aid."), Run::plain(" Local law and licensed practice decide; measure before anyone relies on it.")],
            vec![Run::plain("Molten metal: splash and steam are not in this model. Flames, reflections from polished walls and hot plumes make the truth higher than the figures here.")],
        ]),
        Block::Heading("Irradiance against distance".into()),
        Block::Picture {
            picture: plot(),
            caption: "The curve is the nominal value; what people act on is read from the 97.5 % bound.".into(),
        },
        Block::Heading("Inputs".into()),
    ];
    let inputs = [
        (
            "t_hearth",
            "1250 ± 25 °C",
            "measured",
            "two-colour pyrometer, door open",
        ),
        ("door.width", "0.90 m", "nameplate", "drawing 4417"),
        ("door.height", "0.70 m", "nameplate", "drawing 4417"),
        (
            "door.wall_thickness",
            "0 m",
            "estimate",
            "thin frame; the wall behind is set back",
        ),
        (
            "door.emissivity",
            "0.95 ± 0.03",
            "handbook",
            "cavity of refractory, small opening",
        ),
        ("charger.distance", "2.5 m", "measured", "laser, horizontal"),
        ("charger.stay", "4 min", "estimate", "from the shift plan"),
        ("crane_hand.distance", "8.2 m", "measured", ""),
        ("control_desk.distance", "14.0 m", "measured", ""),
        (
            "air_temperature",
            "31 °C",
            "unconfirmed",
            "to be measured on the day; summer is worse",
        ),
    ];
    blocks.push(Block::Table(Table {
        columns: vec![
            Column::words("input"),
            Column::numbers("entry"),
            Column::words("basis"),
            Column::words("note"),
        ],
        rows: inputs
            .iter()
            .map(|(name, entry, basis, note)| {
                let unconfirmed = *basis == "unconfirmed";
                let basis = if unconfirmed {
                    Run::bold(*basis)
                } else {
                    Run::plain(*basis)
                };
                vec![
                    Cell::runs(vec![Run::bold(*name)]),
                    Cell::plain(*entry),
                    Cell::runs(vec![basis]),
                    Cell::runs(vec![Run::muted(*note)]),
                ]
            })
            .collect(),
    }));
    blocks.push(Block::Heading("Formulas".into()));
    blocks.push(Block::Table(Table {
        columns: vec![
            Column::words("cell"),
            Column::words("formula, and with its numbers"),
            Column::numbers("result"),
        ],
        rows: vec![
            vec![
                Cell::runs(vec![Run::bold("door_area")]),
                Cell::runs(vec![
                    Run::plain("door.width × door.height"),
                    Run::muted("\n0.90 m × 0.70 m"),
                ]),
                Cell::plain("0.630 m²"),
            ],
            vec![
                Cell::runs(vec![Run::bold("door.exitance")]),
                Cell::runs(vec![
                    Run::plain("ε σ T⁴"),
                    Run::muted("\n0.95 × 5.670 374 × 10⁻⁸ W/(m²·K⁴) × (1523.15 K)⁴"),
                ]),
                Cell::plain("290 kW/m²"),
            ],
        ],
    }));
    blocks.push(Block::Heading("Results".into()));
    let rows = (0..26).map(|i| {
        let distance = 0.5 + 0.6 * f64::from(i);
        let value = 57_800.0 * 0.63 / (std::f64::consts::PI * distance * distance + 0.63);
        let (shape, word) = match value {
            v if v > 1400.0 => (Shape::Over, "over"),
            v if v > 295.0 => (Shape::NotAssessed, "not assessed"),
            _ => (Shape::Within, "within"),
        };
        vec![
            Cell::plain(format!("{distance:.1} m")),
            Cell::plain(format!("{value:.0} W/m²")),
            Cell::plain(format!("{:.0} W/m²", value * 1.11)),
            Cell::plain(format!("{:.2}", value / 295.0)),
            Cell::plain(if value > 295.0 {
                "no planned stay"
            } else {
                "unlimited"
            }),
            Cell::finding(shape, word),
        ]
    });
    blocks.push(Block::Table(Table {
        columns: vec![
            Column::numbers("distance"),
            Column::numbers("near infrared"),
            Column::numbers("at most (97.5 %)"),
            Column::numbers("of the limit"),
            Column::numbers("allowed time"),
            Column::words("finding"),
        ],
        rows: rows.collect(),
    }));
    blocks.push(Block::Heading("Ways to comply".into()));
    for way in [
        "Stand at 11.4 m or farther for the whole shift.",
        "A plate 1.80 m high at 1.4 m, if the job allows: what is left behind it is its own glow.",
        "A face filter passing at most 5 % of the near infrared, for those who must stand closer.",
    ] {
        blocks.push(Block::Bullet(vec![Run::plain(way)]));
    }
    blocks.push(Block::Heading("Guidance".into()));
    let guidance = [
        (
            "2006/25/EC annex II, row m",
            "cornea and lens",
            "18 000·t^(−0.75) W/m², t ≤ 1000 s",
            "law; from memory",
        ),
        (
            "2006/25/EC annex II, row n",
            "cornea and lens",
            "100 W/m², t > 1000 s",
            "law; from memory",
        ),
        (
            "time to pain",
            "bare skin",
            "(35/q)^1.33 s, q in kW/m²",
            "evidence; read",
        ),
    ];
    blocks.push(Block::Table(Table {
        columns: vec![
            Column::words("guidance"),
            Column::words("protects"),
            Column::words("limit"),
            Column::words("standing; how known"),
        ],
        rows: guidance
            .iter()
            .map(|row| [row.0, row.1, row.2, row.3].map(Cell::from).to_vec())
            .collect(),
    }));
    blocks.push(Block::Paragraph(vec![Run::muted(
        "Check the edition in force where you work.\nSigns in use: ± ° µ × · − – — ≤ ≥ ≈ √ ² ³ ⁻ ⁴ ₀ ₁ α ε λ σ θ π Σ Δ τ → “ ” ‘ ’ … •",
    )]));
    blocks.push(Block::Together(vec![
        Block::Heading("Signatures".into()),
        Block::Signatures(
            ["Prepared", "Checked", "Approved"]
                .iter()
                .zip(["M. Okafor", "", ""])
                .zip(["2026-12-01", "", ""])
                .map(|((act, name), date)| Signature {
                    act: (*act).into(),
                    name: name.into(),
                    date: date.into(),
                })
                .collect(),
        ),
    ]));
    blocks
}

pub fn meta() -> Meta {
    Meta {
        title: "Charging door, furnace 2 · ε σ T⁴".into(),
        author: Some("M. Okafor".into()),
        subject: Some("Heat radiation worksheet".into()),
        date: Some("2026-12-01".into()),
    }
}

/// The whole way from blocks to a file that can be issued.
pub fn issued(paper: Paper, draft: bool) -> Result<Vec<u8>, Error> {
    let pages = layout::pages(&blocks(), paper, &furniture(draft));
    let pdf = paint::pdf(&pages, &meta())?;
    attach::attach(
        &pdf,
        "charging-door.farglow",
        "application/json",
        NOTEBOOK.as_bytes(),
        "the notebook of this worksheet",
    )
}
