use proptest::prelude::*;

use super::{Library, SHIPPED};
use crate::guidance::{
    Allowed, Envelope, Finding, HowKnown, Limit, Metric, Organ, Origin, Overall, Reason, Standing,
    overall,
};

/// A user's file with one limit, of this metric (after `"quantity": `) and with these pieces.
pub(in crate::guidance) fn own(metric: &str, pieces: &str) -> String {
    format!(
        r#"{{
  "id": "own-rule",
  "title": "Rule of the casting bay",
  "document": "Site rules",
  "issuer": "Works safety office",
  "edition": "3",
  "clause": "rule 4",
  "standing": "site rule",
  "jurisdiction": "this works",
  "effect": "heat on the skin",
  "organ": "skin",
  "metric": {{ "quantity": {metric}, "weighting": "none" }},
  "limit": {pieces},
  "valid": "every stay; an end belongs to the piece before it",
  "how_known": "read",
  "band_how_known": "read",
  "where_known": "the printed rule",
  "caution": "holds in the casting bay alone"
}}"#
    )
}

fn sound() -> String {
    own(
        r#""irradiance", "band": "all wavelengths""#,
        r#"[{ "limit": "500 W/m²" }]"#,
    )
}

#[test]
fn the_shipped_files_pass_the_gate_that_a_users_file_passes() {
    let mut library = Library::default();
    // Row m names row n, so that one goes first.
    for at in [1, 0, 2, 3, 4, 5] {
        let (name, bytes) = SHIPPED[at];
        library = library.with_own(name, bytes).unwrap_or_else(|faults| {
            panic!("{faults:?}");
        });
    }
    let shipped = Library::shipped();
    assert_eq!(library.limits().len(), SHIPPED.len());
    for (own, shipped) in library.limits().iter().zip(shipped.limits()) {
        assert_eq!(own.id, shipped.id);
        assert_eq!(own.pieces, shipped.pieces, "{}", own.id);
        assert_eq!(shipped.origin, Origin::Shipped, "{}", own.id);
    }
}

#[test]
fn every_shipped_limit_says_how_it_is_known_and_none_more_surely_than_it_is() {
    for (id, standing, organ, metric, band) in [
        (
            "eu-2006-25-m",
            Standing::Law,
            Organ::Eye,
            Metric::NearInfraredIrradiance,
            HowKnown::Read,
        ),
        (
            "eu-2006-25-n",
            Standing::Law,
            Organ::Eye,
            Metric::NearInfraredIrradiance,
            HowKnown::Read,
        ),
        (
            "eu-2006-25-o",
            Standing::Law,
            Organ::Skin,
            Metric::SkinDose,
            HowKnown::Read,
        ),
        (
            "icnirp-2013-ir-eye",
            Standing::Guidance,
            Organ::Eye,
            Metric::NearInfraredIrradiance,
            HowKnown::Memory,
        ),
        (
            "icnirp-2013-skin",
            Standing::Guidance,
            Organ::Skin,
            Metric::SkinDose,
            HowKnown::Read,
        ),
        (
            "pain-time",
            Standing::Evidence,
            Organ::Skin,
            Metric::TotalIrradiance,
            HowKnown::Memory,
        ),
    ] {
        let limit = Library::shipped().get(id).expect("it is shipped");
        assert_eq!(limit.standing, standing, "{id}");
        assert_eq!(limit.organ, organ, "{id}");
        assert_eq!(limit.metric, metric, "{id}");
        assert_eq!(limit.band_how_known, band, "{id}");
        // Nobody has read these numbers in the published text.
        assert_eq!(limit.how_known, HowKnown::Memory, "{id}");
        assert!(limit.needs_confirming(), "{id}");
    }
    let words = HowKnown::Memory.words();
    assert_eq!(words, "recalled, not read: confirm in the edition in force");
}

#[test]
fn a_limit_is_cited_in_one_line() {
    let row = Library::shipped()
        .get("eu-2006-25-m")
        .expect("it is shipped");
    assert_eq!(
        row.citation(),
        "European Parliament and Council, Directive 2006/25/EC on the minimum health and safety requirements regarding the exposure of workers to risks arising from physical agents (artificial optical radiation) (2006), Annex I, Table 1.1, row m, OJ L 114, 27.4.2006, p. 38"
    );
    assert_eq!(
        row.standing_words(),
        "law: European Union: national law decides"
    );
    assert_eq!(row.envelope(), Envelope::Eye);
    let own = Library::read("bay.json", sound().as_bytes()).expect("the file is sound");
    let rule = own.get("own-rule").expect("it is there");
    assert_eq!(
        rule.standing_words(),
        "site rule: this works (entered by the user in bay.json)"
    );
    assert_eq!(rule.envelope(), Envelope::Skin);
}

#[test]
fn a_limit_is_written_with_the_stays_to_which_each_piece_applies() {
    for (id, text) in [
        (
            "eu-2006-25-m",
            "18000 W/m² * (t / 1 s)^(-0.75) for t up to and including 1000 s",
        ),
        ("eu-2006-25-n", "100 W/m² for t longer than 1000 s"),
        (
            "icnirp-2013-ir-eye",
            "18000 W/m² * (t / 1 s)^(-0.75) for t under 1000 s; 100 W/m² for t of 1000 s and longer",
        ),
        (
            "pain-time",
            "35 kW/m² * (t / 1 s)^(-1 / 1.33) for t up to and including 55.8616 s",
        ),
    ] {
        let limit = Library::shipped().get(id).expect("it is shipped");
        assert_eq!(limit.limit_text(), text, "{id}");
    }
    let own = Library::read("bay.json", sound().as_bytes()).expect("the file is sound");
    assert_eq!(own.limits()[0].limit_text(), "500 W/m² for every t");
}

#[test]
fn reasons_and_times_are_said_in_words() {
    for (finding, text) in [
        (Finding::Within, "within"),
        (Finding::Over, "over"),
        (Finding::BelowOnset, "below onset"),
        (Finding::OnsetReached, "onset reached"),
        (
            Finding::NotAssessed(Reason::NoStay),
            "not assessed: no stay is stated",
        ),
        (
            Finding::NotAssessed(Reason::Beyond { until: 10.0 }),
            "not assessed: this guidance says nothing about stays past 10 s",
        ),
        (
            Finding::NotAssessed(Reason::Before { from: 1000.0 }),
            "not assessed: this guidance speaks only of stays longer than 1000 s",
        ),
    ] {
        assert_eq!(finding.text(), text);
    }
    for (allowed, text) in [
        (Allowed::Unlimited, "unlimited"),
        (Allowed::Seconds(3.9), "no planned stay"),
        (Allowed::Seconds(59.99), "59 s"),
        (Allowed::Seconds(1000.0_f64.next_down()), "16 min"),
        (Allowed::CappedAt(10.0), "10 s, and nothing is said beyond"),
        (
            Allowed::CappedAt(0.0),
            "no planned stay, and nothing is said beyond",
        ),
    ] {
        assert_eq!(allowed.text(), text, "{allowed:?}");
    }
}

#[test]
fn a_family_is_the_rows_in_order_of_time() {
    let library = Library::shipped();
    for (id, expected) in [
        ("eu-2006-25-m", vec!["eu-2006-25-m", "eu-2006-25-n"]),
        ("eu-2006-25-n", vec!["eu-2006-25-m", "eu-2006-25-n"]),
        ("eu-2006-25-o", vec!["eu-2006-25-o"]),
        ("eu-2006-25-z", vec![]),
    ] {
        let family: Vec<&str> = library
            .family(id)
            .iter()
            .map(|row| row.id.as_str())
            .collect();
        assert_eq!(family, expected, "{id}");
    }
    let course = library.course("eu-2006-25-n").expect("it is shipped");
    assert_eq!(course.joints().collect::<Vec<_>>(), [1000.0]);
    assert_eq!((course.start(), course.end()), (0.0, None));
}

#[test]
fn an_unknown_id_is_answered_with_the_nearest() {
    let library = Library::shipped();
    for (asked, text) in [
        (
            "eu-2006-25m",
            "no guidance is named `eu-2006-25m`, did you mean `eu-2006-25-m`?",
        ),
        (
            "Pain_Time",
            "no guidance is named `Pain_Time`, did you mean `pain-time`?",
        ),
        (
            "x",
            "no guidance is named `x`: see the list of guidance for the ids there are",
        ),
    ] {
        let found = library
            .judge(asked, 1.0, Some(1.0))
            .expect_err("it is not shipped");
        assert_eq!(found.to_string(), text);
    }
}

#[test]
fn a_users_rule_may_continue_a_shipped_row_that_ends() {
    let next = sound()
        .replace("own-rule", "after-ten")
        .replace(
            r#""irradiance", "band": "all wavelengths""#,
            r#""dose", "band": "380 nm to 3000 nm""#,
        )
        .replace("500 W/m²", "500 W/m² * t")
        .replace(r#""limit": ["#, r#""from": "10 s", "limit": ["#);
    let first = sound()
        .replace(
            r#""irradiance", "band": "all wavelengths""#,
            r#""dose", "band": "380 nm to 3000 nm""#,
        )
        .replace(
            r#"[{ "limit": "500 W/m²" }]"#,
            r#"[{ "before": "10 s", "limit": "9000 W/m² * t" }]"#,
        )
        .replace(r#""valid""#, r#""continued_by": "after-ten", "valid""#);
    let both = format!("[{first},\n{next}]");
    let library = Library::shipped()
        .with_own("bay.json", both.as_bytes())
        .unwrap_or_else(|faults| panic!("{faults:?}"));
    assert_eq!(library.limits().len(), SHIPPED.len() + 2);
    for (stay, finding) in [(9.0, Finding::Within), (10.0, Finding::Over)] {
        for id in ["own-rule", "after-ten"] {
            let found = library.judge(id, 600.0, Some(stay)).expect("it is loaded");
            assert_eq!(found.finding, finding, "{id} for {stay} s");
        }
    }
}

#[test]
fn a_row_without_a_row_before_it_grants_nothing_before_it() {
    let late = sound().replace(r#""limit": ["#, r#""from": "100 s", "limit": ["#);
    let library = Library::read("late.json", late.as_bytes()).expect("the file is sound");
    let course = library.course("own-rule").expect("it is there");
    assert_eq!(course.allowed(501.0), Ok(Allowed::CappedAt(0.0)));
    assert_eq!(course.allowed(500.0), Ok(Allowed::Unlimited));
    let early = course.judge(400.0, Some(100.0)).expect("it is an exposure");
    assert_eq!(
        early.finding,
        Finding::NotAssessed(Reason::Before { from: 100.0 })
    );
    let late = course.judge(501.0, Some(101.0)).expect("it is an exposure");
    assert_eq!(late.finding, Finding::Over);
}

#[test]
fn a_faulty_file_is_refused_with_its_place() {
    let whole = sound();
    let irradiance = r#""irradiance", "band": "all wavelengths""#;
    let piece = |pieces: &str| own(irradiance, pieces);
    let cases: Vec<(String, usize, usize, &str)> = vec![
        (String::new(), 1, 1, "empty"),
        ("[]".into(), 1, 1, "expected at least one limit"),
        ("3".into(), 1, 1, "expected an object with the fields"),
        (whole[..200].into(), 9, 11, "breaks off"),
        (
            whole.replace("\"title\"", "\"titel\""),
            3,
            3,
            "unknown field `titel`, did you mean `title`?",
        ),
        (
            whole.replace("\"edition\": \"3\",", "\"clause\": \"3\","),
            7,
            3,
            "given twice",
        ),
        (
            whole.replace("  \"clause\": \"rule 4\",\n", ""),
            1,
            1,
            "the field `clause` is missing: a limit without its citation is not used",
        ),
        (
            whole.replace("Works safety office", " "),
            5,
            13,
            "expected text, found none",
        ),
        (
            whole.replace("\"site rule\"", "\"site rules\""),
            8,
            15,
            "did you mean `site rule`?",
        ),
        (
            whole.replace("\"site rule\"", "4"),
            8,
            15,
            "expected text in quotation marks, found a number",
        ),
        (
            whole.replace("\"organ\": \"skin\"", "\"organ\": \"foot\""),
            11,
            12,
            "expected one of `eye (cornea and lens)`",
        ),
        (
            whole.replace("own-rule", "Own rule"),
            2,
            9,
            "expected small letters",
        ),
        (
            own(r#""radiance", "band": "all wavelengths""#, "[]"),
            12,
            13,
            "unknown metric radiance / all wavelengths / none",
        ),
        (piece("[]"), 13, 12, "expected a list of 1 to 1000 pieces"),
        (piece(r#"[{ "limit": "500 W/m² + 1 s" }]"#), 13, 24, "W/m²"),
        (
            piece(r#"[{ "limit": "500 J/m²" }]"#),
            13,
            24,
            "expected an irradiance (W/m²)",
        ),
        (
            piece(r#"[{ "limit": "500" }]"#),
            13,
            24,
            "expected an irradiance (W/m²)",
        ),
        (
            piece(r#"[{ "limit": "500 W/m² * (alpha / 1 s)" }]"#),
            13,
            24,
            "alpha",
        ),
        (piece(r#"[{ "limit": "500 W/m² *" }]"#), 13, 24, ""),
        (
            piece(r#"[{ "limit": "500 W/m² < 3 W/m²" }]"#),
            13,
            24,
            "expected an irradiance (W/m²)",
        ),
        (
            piece(r#"[{ "limit": "0 W/m²" }]"#),
            13,
            24,
            "greater than zero",
        ),
        (
            piece(r#"[{ "limit": "-500 W/m²" }]"#),
            13,
            24,
            "greater than zero",
        ),
        (
            piece(r#"[{ "limit": "500 W/m² * (t / 1 s)" }]"#),
            13,
            24,
            "never rises",
        ),
        (
            piece(r#"[{ "until": "9 s", "limit": "500 W/m² / (5 - t / 1 s)" }]"#),
            13,
            40,
            "never rises",
        ),
        (
            piece(r#"[{ "until": "9 s", "limit": "500 W/m²" }, { "limit": "501 W/m²" }]"#),
            13,
            54,
            "found a step up from 500",
        ),
        (
            piece(r#"[{ "limit": "500 W/m²" }, { "limit": "400 W/m²" }]"#),
            13,
            13,
            "only the last piece",
        ),
        (
            piece(r#"[{ "until": "9 s", "before": "9 s", "limit": "500 W/m²" }]"#),
            13,
            13,
            "found both",
        ),
        (
            piece(r#"[{ "until": "9 m", "limit": "500 W/m²" }]"#),
            13,
            24,
            "expected a time (s)",
        ),
        (
            piece(r#"[{ "until": "0 s", "limit": "500 W/m²" }]"#),
            13,
            24,
            "greater than zero",
        ),
        (
            piece(r#"[{ "until": "t", "limit": "500 W/m²" }]"#),
            13,
            24,
            "`t`",
        ),
        (
            piece(
                r#"[{ "until": "9 s", "limit": "500 W/m²" }, { "until": "8 s", "limit": "400 W/m²" }]"#,
            ),
            13,
            54,
            "later than its start",
        ),
        (
            piece(r#"[{ "until": "9 s", "limit": "500 W/m²" }]"#)
                .replace("\"valid\"", "\"continued_by\": \"own-rule\", \"valid\""),
            14,
            19,
            "comes to continue itself",
        ),
        (
            piece(r#"[{ "until": "9 s", "limit": "500 W/m²" }]"#)
                .replace("\"valid\"", "\"continued_by\": \"pain-tim\", \"valid\""),
            14,
            19,
            "did you mean `pain-time`?",
        ),
        (
            piece(r#"[{ "until": "9 s", "limit": "500 W/m²" }]"#)
                .replace("\"valid\"", "\"continued_by\": \"pain-time\", \"valid\""),
            14,
            19,
            "expected evidence to be continued by evidence",
        ),
        (
            piece(r#"[{ "until": "9 s", "limit": "500 W/m²" }]"#)
                .replace("\"valid\"", "\"continued_by\": \"eu-2006-25-o\", \"valid\""),
            14,
            19,
            "expected a successor for total irradiance",
        ),
        (
            whole.replace("\"valid\"", "\"continued_by\": \"pain-time\", \"valid\""),
            14,
            19,
            "cannot continue a limit that has no end",
        ),
        (
            whole.replace("own-rule", "pain-time"),
            2,
            9,
            "is taken by \"Time to pain on bare skin\"",
        ),
        (
            format!("[{whole},\n{whole}]"),
            21,
            9,
            "is taken by \"Rule of the casting bay\"",
        ),
        (
            whole.replace("\"how_known\": \"read\"", "\"how_known\": \"sure\""),
            15,
            16,
            "expected one of `read`, `memory`, `common practice`",
        ),
    ];
    for (file, line, column, words) in cases {
        let faults = Library::shipped()
            .with_own("bay.json", file.as_bytes())
            .expect_err(words);
        let fault = &faults[0];
        let found = (fault.place.line, fault.place.column);
        assert_eq!(found, (line, column), "{words}: {fault}");
        assert!(
            fault.to_string().contains(words),
            "expected {words:?} in: {fault}"
        );
    }
}

#[test]
fn rows_that_do_not_adjoin_are_refused() {
    let irradiance = r#""irradiance", "band": "all wavelengths""#;
    let first = own(irradiance, r#"[{ "until": "9 s", "limit": "500 W/m²" }]"#)
        .replace("\"valid\"", "\"continued_by\": \"next-rule\", \"valid\"");
    let next = |from: &str, limit: &str| {
        sound()
            .replace("own-rule", "next-rule")
            .replace("500 W/m²", limit)
            .replace(
                "\"limit\": [",
                &format!("\"from\": \"{from}\", \"limit\": ["),
            )
    };
    let other = first.replace("own-rule", "other-rule");
    for (rows, words) in [
        (
            vec![first.clone(), next("10 s", "400 W/m²")],
            "expected a successor from 9 s",
        ),
        (
            vec![first.clone(), next("8 s", "400 W/m²")],
            "expected a successor from 9 s",
        ),
        (
            vec![first.clone(), next("9 s", "501 W/m²")],
            "found a step up from 500",
        ),
        (
            vec![first.clone(), other, next("9 s", "400 W/m²")],
            "a row continues one other at most",
        ),
    ] {
        let file = format!("[{}]", rows.join(","));
        let faults = Library::read("bay.json", file.as_bytes()).expect_err(words);
        assert!(
            faults[0].to_string().contains(words),
            "expected {words:?} in: {}",
            faults[0]
        );
    }
    let sound = format!("[{first},{}]", next("9 s", "400 W/m²"));
    let library = Library::read("bay.json", sound.as_bytes()).expect("the rows adjoin");
    assert_eq!(library.family("next-rule").len(), 2);
}

#[test]
fn every_fault_of_a_file_is_told_at_once() {
    let file = sound()
        .replace("\"site rule\"", "\"custom\"")
        .replace("500 W/m²", "500 K")
        .replace("\"rule 4\"", "\"\"");
    let faults = Library::read("bay.json", file.as_bytes()).expect_err("it has three faults");
    let lines: Vec<usize> = faults.iter().map(|fault| fault.place.line).collect();
    assert_eq!(lines, [7, 8, 13], "{faults:?}");
}

#[test]
fn overall_is_over_before_it_is_not_assessed_before_it_is_within() {
    let shipped = Library::shipped();
    let row = |id: &str| shipped.get(id).expect("it is shipped");
    let of = |organ: Organ| Limit {
        organ,
        ..row("eu-2006-25-m").clone()
    };
    let (retina, strain) = (of(Organ::Retina), of(Organ::HeatStrain));
    let (eye, skin, pain) = (row("eu-2006-25-m"), row("eu-2006-25-o"), row("pain-time"));
    let unknown = Finding::NotAssessed(Reason::NoStay);
    for (findings, text) in [
        (
            vec![],
            "not assessed: eye (cornea and lens), retina, skin, heat strain",
        ),
        (
            vec![(eye, Finding::Within)],
            "not assessed: retina, skin, heat strain; within: eye (cornea and lens)",
        ),
        (
            vec![(eye, Finding::Within), (skin, unknown)],
            "not assessed: retina, skin, heat strain; within: eye (cornea and lens)",
        ),
        // Evidence covers nothing.
        (
            vec![(pain, Finding::BelowOnset)],
            "not assessed: eye (cornea and lens), retina, skin, heat strain",
        ),
        (
            vec![(pain, Finding::OnsetReached)],
            "over: onset reached: skin",
        ),
        (
            vec![(eye, Finding::Over), (skin, unknown)],
            "over: eye (cornea and lens)",
        ),
        (
            vec![
                (eye, Finding::Over),
                (eye, Finding::Over),
                (pain, Finding::OnsetReached),
            ],
            "over: eye (cornea and lens); onset reached: skin",
        ),
        (
            vec![
                (&strain, Finding::Within),
                (skin, Finding::Within),
                (eye, Finding::Within),
                (&retina, Finding::Within),
            ],
            "within: eye (cornea and lens), retina, skin, heat strain",
        ),
        (
            vec![
                (&strain, Finding::Within),
                (skin, Finding::Over),
                (eye, Finding::Within),
                (&retina, Finding::Within),
            ],
            "over: skin",
        ),
    ] {
        let found: Overall = overall(findings.iter().copied());
        assert_eq!(found.text(), text, "{findings:?}");
        assert!(text.starts_with(found.word()), "{text}");
    }
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn a_damaged_file_is_refused_or_read_but_never_stops_the_program(
        at in any::<prop::sample::Index>(), sign in any::<char>(), cut in any::<bool>(), piece in ".{0,40}",
    ) {
        let whole = own(
            r#""irradiance", "band": "all wavelengths""#,
            &format!(r#"[{{ "limit": "500 W/m² * {}" }}]"#, piece.replace(['"', '\\'], "")),
        );
        let mut signs: Vec<char> = whole.chars().collect();
        let at = at.index(signs.len());
        if cut { signs.truncate(at) } else { signs[at] = sign }
        let file: String = signs.into_iter().collect();
        match Library::read("bay.json", file.as_bytes()) {
            Ok(library) => {
                for exposure in [0.0, 1.0, 1e9] {
                    let id = library.limits()[0].id.as_str();
                    let found = library.judge(id, exposure, Some(60.0)).expect("it is loaded");
                    prop_assert!(found.ratio.is_none_or(f64::is_finite), "{:?}", found);
                }
            }
            Err(faults) => prop_assert!(!faults.is_empty()),
        }
    }
}
