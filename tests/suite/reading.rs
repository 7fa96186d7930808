//! Joint files that are read: the shipped examples, overrides, and one joint written in two ways.

use weldpole::input::{Options, catalog, read_joint};
use weldpole::model::{Discretisation, Joint, LawForm, Run};
use weldpole::units::UnitSystem;

/// Two ways of writing a number differ by a few roundings at most.
const ROUNDING: f64 = 1e-12;

fn read(text: &str) -> Joint {
    read_with(text, &Options::default())
}

fn read_with(text: &str, options: &Options) -> Joint {
    read_joint("folder/test.toml", text, options)
        .map_err(|faults| faults.iter().map(ToString::to_string).collect::<Vec<_>>())
        .expect("a file without faults")
}

fn set(pairs: &[(&str, &str)]) -> Options {
    let set = pairs.iter().map(|(name, text)| ((*name).to_owned(), (*text).to_owned())).collect();
    Options { set, ..Options::default() }
}

fn close(a: f64, b: f64) -> bool {
    (a - b).abs() <= ROUNDING * a.abs().max(b.abs()).max(1.0)
}

/// Every number of the welds and cases, in order.
fn numbers(joint: &Joint) -> Vec<f64> {
    let mut all = Vec::new();
    for weld in joint.group.welds() {
        all.extend([weld.size.throat(), weld.size.deformation_size(), weld.filler.strength]);
        for run in &weld.runs {
            for fraction in [0.0, 0.3, 1.0] {
                all.extend(run.point(fraction).iter());
            }
        }
    }
    for case in &joint.cases {
        all.extend(case.wrench.force.iter().chain(case.wrench.moment.iter()));
    }
    all
}

const SMALL: &str = "units = \"metric\"\nrules = \"nominal\"\n[filler]\nstrength = 490\n";
const WELD: &str = "[[weld]]\nname = \"a\"\nleg = 6\npath = [[0, 0], [100, 0]]\n";
const LOAD: &str = "[[load]]\ncase = \"x\"\nat = [50, 20]\nforce = [0, -10]\n";

#[test]
fn every_example_is_read() {
    for (name, text) in
        [("demo", catalog::DEMO), ("starter", catalog::STARTER)].into_iter().chain(catalog::EXAMPLES)
    {
        let joint = read(text);
        assert!(!joint.cases.is_empty(), "{name}");
    }
    let demo = read(catalog::DEMO);
    assert!(demo.combined && demo.cases.len() == 2 && demo.plates.len() == 2);
    assert!(close(demo.group.longest_run(), 240.0));
}

#[test]
fn every_example_file_is_shipped() {
    let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("data/examples");
    let mut files: Vec<String> = std::fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect();
    files.sort();
    let mut shipped: Vec<String> = catalog::EXAMPLES.iter().map(|(name, _)| (*name).to_owned()).collect();
    shipped.extend(["demo.toml".to_owned(), "starter.toml".to_owned()]);
    shipped.sort();
    assert_eq!(files, shipped);
}

#[test]
fn overrides_replace_parameters_rules_law_and_elements() {
    let joint = read_with(catalog::DEMO, &set(&[("depth", "10 in"), ("reach", "depth/4")]));
    assert!(close(joint.group.longest_run(), 254.0));
    assert!(close(joint.group.welds()[0].runs[0].length(), 63.5));
    let options = Options {
        elements: Some(20),
        law: Some("rigid-plastic".to_owned()),
        rules: Some("nominal".to_owned()),
        ..Options::default()
    };
    let joint = read_with(catalog::DEMO, &options);
    assert_eq!(joint.discretisation, Discretisation::Elements(20));
    assert_eq!((joint.law.id.as_str(), joint.rules.id.as_str()), ("rigid-plastic", "nominal"));
}

#[test]
fn bad_overrides_are_faults_of_their_option() {
    let options = Options {
        set: vec![("dept".to_owned(), "1 mm".to_owned()), ("reach".to_owned(), "2 kN".to_owned())],
        elements: Some(0),
        law: Some("lesik-kenedy".to_owned()),
        rules: Some("nominl".to_owned()),
    };
    let faults = read_joint("demo.toml", catalog::DEMO, &options).unwrap_err();
    let text: Vec<String> = faults.iter().map(ToString::to_string).collect();
    for expected in [
        "--set: in `dept=1 mm`: the file has no parameter of this name; accepted: `depth`, `reach`, `arm`; \
         hint: did you mean `depth`?",
        "--elements: the number of elements is out of range, found 0; accepted: 1 to 100000",
        "demo.toml:32:10: a point of `path` must be a length, found a force; accepted: a length, for example \
         `12 mm`",
    ] {
        assert!(text.iter().any(|line| line == expected), "{expected}\nin\n{}", text.join("\n"));
    }
    assert!(text.iter().any(|line| line.starts_with("--law: unknown law `lesik-kenedy`")));
    assert!(text.iter().any(|line| line.starts_with("--rules: unknown rule set `nominl`")));
}

#[test]
fn metric_and_us_units_give_the_same_joint() {
    // The example in US units, written in metric: 1 in = 25.4 mm, 1 kip = 4.4482216152605 kN, both exact.
    let metric = "units = \"metric\"\nrules = \"aisc-360-22-lrfd\"\n[filler]\nclass = \"E70\"\n\
        [[weld]]\nname = \"bracket\"\nleg = 9.525\n\
        path = [[127, 0], [0, 0], [0, 254], [127, 254]]\n\
        [[load]]\ncase = \"factored\"\nat = [254, 127]\nforce = [0, -355.85772922084]\n";
    let us = read(catalog::EXAMPLES.iter().find(|(name, _)| *name == "us-units.toml").unwrap().1);
    let metric = read(metric);
    assert_eq!(us.units, UnitSystem::Us);
    let (a, b) = (numbers(&us), numbers(&metric));
    assert_eq!(a.len(), b.len());
    for (a, b) in a.iter().zip(&b) {
        assert!(close(*a, *b), "{a} {b}");
    }
}

#[test]
fn bare_numbers_and_texts_give_the_same_joint() {
    let bare = read(&format!("{SMALL}{WELD}{LOAD}moment = 2.5\n"));
    let text = format!("{SMALL}{WELD}{LOAD}moment = \"2500 kN mm\"\n")
        .replace("leg = 6", "leg = \"0.6 cm\"")
        .replace("[100, 0]", "[\"0.1 m\", \"0 in\"]")
        .replace("strength = 490", "strength = \"0.49 kN/mm^2\"");
    for (a, b) in numbers(&bare).iter().zip(numbers(&read(&text))) {
        assert!(close(*a, b), "{a} {b}");
    }
}

#[test]
fn loads_of_one_case_add_and_factors_apply_to_loads() {
    let twice = read(&format!("{SMALL}{WELD}{LOAD}{LOAD}"));
    assert!(!twice.combined && twice.cases.len() == 1);
    assert!(close(twice.cases[0].wrench.force.y, -20e3));
    // -20 kN at x = 50 mm about the origin.
    assert!(close(twice.cases[0].wrench.moment.z, -1e6));
    let text = format!(
        "{SMALL}{WELD}{LOAD}[[load]]\ncase = \"m\"\nmoment = 3\n[[combination]]\nname = \"c\"\n\
         factors = {{ x = 1.5, m = \"-2\" }}\n"
    );
    let combined = read(&text);
    assert!(combined.combined && combined.cases.len() == 1);
    assert!(close(combined.cases[0].wrench.force.y, -15e3));
    assert!(close(combined.cases[0].wrench.moment.z, -0.75e6 - 6e6));
}

#[test]
fn a_zero_load_is_no_fault() {
    let joint = read(&format!("{SMALL}{WELD}[[load]]\ncase = \"none\"\nmoment = 0\n"));
    assert!(joint.cases[0].wrench.moment.norm() <= 0.0);
}

#[test]
fn optional_keys_have_their_defaults() {
    let joint = read(&format!("{SMALL}{WELD}{LOAD}"));
    assert_eq!(joint.title, "test.toml");
    assert_eq!(joint.law.id, "lesik-kennedy");
    assert_eq!(joint.discretisation, Discretisation::Continuous);
    assert_eq!(joint.group.welds()[0].sides, 1);
    let ring = "[[weld]]\nname = \"r\"\nleg = 6\narc = { centre = [0, 0], radius = 50 }\n";
    let joint = read(&format!("{SMALL}{ring}{LOAD}"));
    assert!(matches!(joint.group.welds()[0].runs[0], Run::Arc { start, sweep, .. }
        if start.abs() <= 0.0 && close(sweep, std::f64::consts::TAU)));
}

#[test]
fn fillers_of_one_weld_take_every_form() {
    for (filler, strength) in [
        ("\"E70\"", 70.0 * 6.894_757_293_168_361),
        ("500", 500.0),
        ("\"0.5 GPa\"", 500.0),
        ("\"2*f\"", 510.0),
        ("\"f\"", 255.0),
        ("{ class = \"E49\" }", 490.0),
        ("{ strength = 480 }", 480.0),
    ] {
        let weld = format!("{WELD}filler = {filler}\n");
        let text =
            format!("units = \"metric\"\nrules = \"nominal\"\n[parameters]\nf = \"255 MPa\"\n{weld}{LOAD}");
        assert!(close(read(&text).group.welds()[0].filler.strength, strength), "{filler}");
    }
}

#[test]
fn a_law_of_ones_own() {
    let law = "[law]\nname = \"our tests, batch 3\"\n[[law.curve]]\nangle = 0\n\
        points = [[0, 0], [0.05, 0.8], [0.10, 1.0], [0.17, 0.97]]\n\
        [[law.curve]]\nangle = \"90 deg\"\npoints = [[0, 0], [0.03, 1.2], [0.06, 1.5]]\n";
    let joint = read(&format!("{SMALL}{law}{WELD}{LOAD}"));
    let LawForm::Table(table) = &joint.law.form else { panic!("a table") };
    assert_eq!(table.curves().len(), 2);
    assert!(close(table.curves()[1].angle, 90.0));
    assert_eq!(joint.law.title, "our tests, batch 3");
}

#[test]
fn both_sides_of_each_threshold() {
    let accepted = |weld: &str| read_joint("f", &format!("{SMALL}{weld}{LOAD}"), &Options::default()).is_ok();
    let with = |line: &str| format!("{WELD}{line}\n");
    for (line, fine) in [
        ("dihedral = 60", true),
        ("dihedral = 59.99", false),
        ("dihedral = 120", true),
        ("dihedral = 120.01", false),
        ("dihedral = \"90 deg\"", true),
        ("sides = 1", true),
        ("sides = 2.0", true),
        ("sides = 0", false),
        ("sides = 3", false),
        ("sides = 1.5", false),
        ("filler = 1", true),
        ("filler = 0.99", false),
        ("filler = 100001", false),
    ] {
        assert_eq!(accepted(&with(line)), fine, "{line}");
    }
    let sized = |leg: &str| WELD.replace("leg = 6", &format!("leg = {leg}"));
    for (leg, fine) in [("0.001", true), ("0.000999", false), ("0", false), ("1e8", true), ("1.1e8", false)] {
        assert_eq!(accepted(&sized(leg)), fine, "{leg}");
    }
    let arc = |sweep: &str| {
        format!(
            "[[weld]]\nname = \"r\"\nleg = 6\narc = {{ centre = [0, 0], radius = 50, sweep = {sweep} }}\n"
        )
    };
    for (sweep, fine) in [("360", true), ("-360", true), ("361", false), ("0", false), ("0.01", true)] {
        assert_eq!(accepted(&arc(sweep)), fine, "{sweep}");
    }
    let elements = |count: &str| {
        let text = format!("elements = {count}\n{SMALL}{WELD}{LOAD}");
        read_joint("f", &text, &Options::default()).is_ok()
    };
    assert!(elements("1") && elements("100000") && elements("\"100\""));
    assert!(!elements("0") && !elements("100001") && !elements("1.5") && !elements("-1"));
}

#[test]
fn forces_by_size_and_angle_are_exact_at_right_angles() {
    let text =
        format!("{SMALL}{WELD}{LOAD}").replace("force = [0, -10]", "force = { size = 10, angle = -90 }");
    assert_eq!(numbers(&read(&text)), numbers(&read(&format!("{SMALL}{WELD}{LOAD}"))));
}

#[test]
fn reading_is_repeatable() {
    assert_eq!(read(catalog::DEMO), read(catalog::DEMO));
}
