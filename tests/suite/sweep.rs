//! Sweeps against single analyses, independent values along the eccentricity, jumps, and points without answer.

use crate::shapes::{KIP_PER_INCH, LEG, LENGTH};
use weldpole::analysis::{CaseReport, Report, Section, Status, analyse};
use weldpole::diagnostic::Diagnostic;
use weldpole::input::{Options, Template, catalog, read_joint};
use weldpole::model::{Basis, Joint};
use weldpole::study::load::{Wanted, varied};
use weldpole::study::sweep::{Jump, Point, PointCase, Sweep, sweep};

/// The README's lines under 10 degrees, 2 mm beside the centroid: three states.
const LINES: &str = r#"
units = "metric"
rules = "nominal"
[filler]
strength = 490
[[weld]]
name = "left"
leg = 6
path = [[-75, -50], [-75, 50]]
[[weld]]
name = "right"
leg = 6
path = [[75, -50], [75, 50]]
[[load]]
case = "pull"
at = ["2 mm / cos(10 deg)", 0]
force = { size = 100, angle = 80 }
"#;

/// A C in inches with a moment case beside its force.
const C: &str = r#"
units = "us"
rules = "aisc-360-22-lrfd"
[parameters]
reach = "10 in"
p = "80 kip"
[filler]
class = "E70"
[[weld]]
name = "c"
leg = "3/8 in"
path = [[5, 0], [0, 0], [0, 10], [5, 10]]
[[load]]
case = "hoist"
at = ["reach", 5]
force = [0, "-p"]
[[load]]
case = "twist"
moment = 20
"#;

fn template(text: &str) -> Template {
    Template::read("test.toml", text, &Options::default()).unwrap()
}

fn try_sweep(text: &str, ranges: &[&str], case: Option<&str>) -> Result<Sweep, Vec<Diagnostic>> {
    let template = template(text);
    let ranges: Vec<String> = ranges.iter().map(|range| (*range).to_owned()).collect();
    sweep(&template, &template.variables(&ranges)?, case, &|_| ())
}

/// The sweep of one text over ranges written as on the command line.
fn swept(text: &str, ranges: &[&str]) -> Sweep {
    try_sweep(text, ranges, None).unwrap()
}

fn only_case(point: &Point) -> &PointCase {
    let answer = point.outcome.as_ref().unwrap();
    assert_eq!(answer.cases.len(), 1);
    &answer.cases[0]
}

fn ultimate(point: &Point) -> f64 {
    only_case(point).ultimate.unwrap().load_factor
}

/// Every number of a point is that of the report, bit for bit.
fn assert_same(point: &Point, report: &Report) {
    let answer = point.outcome.as_ref().unwrap();
    assert_eq!((answer.cases.len(), answer.governing), (report.cases.len(), report.governing));
    for (own, case) in answer.cases.iter().zip(&report.cases) {
        assert_same_case(own, case, &report.joint);
    }
    assert_eq!(point.status(), report.verdict());
}

fn assert_same_case(own: &PointCase, case: &CaseReport, joint: &Joint) {
    let bits = |values: Vec<Option<f64>>| -> Vec<Option<u64>> {
        values.into_iter().map(|value| value.map(f64::to_bits)).collect()
    };
    let (ultimate, elastic) = (case.ultimate_strength(joint), case.elastic_strength(joint));
    let answer = case.ultimate();
    let found = bits(vec![
        own.ultimate.map(|strength| strength.load_factor),
        own.ultimate.and_then(|strength| strength.design_load_factor),
        own.elastic.map(|strength| strength.load_factor),
        own.peak_load_factor,
        own.centre.map(|centre| centre[0]),
        own.utilisation().filter(|_| own.verification.is_some()),
        own.demand.map(|demand| demand.size),
    ]);
    let expected = bits(vec![
        ultimate.map(|strength| strength.load_factor),
        ultimate.and_then(|strength| strength.design_load_factor),
        elastic.map(|strength| strength.load_factor),
        answer.and_then(|answer| answer.peak_load_factor),
        answer.and_then(|answer| answer.governing().centre).map(|centre| centre[0]),
        case.verification.as_ref().map(|verification| verification.utilisation),
        case.checks.first().map(|check| check.demand),
    ]);
    assert_eq!(found, expected, "{}", case.name);
    assert_eq!(own.states, answer.map_or(0, |answer| answer.states.len()));
    assert_eq!((own.status, &own.verification), (case.status, &case.verification));
}

#[test]
fn points_of_parameters_are_single_checks_bit_for_bit() {
    let found = swept(catalog::DEMO, &["arm=150 mm:600 mm:4", "depth=0.2 m:240 mm:2"]);
    assert_eq!((found.points.len(), found.shown_name()), (8, "1.2 dead + 1.6 crane"));
    for point in &found.points {
        let set = ["arm", "depth"].iter().zip(&point.values);
        let set = set.map(|(name, value)| ((*name).to_owned(), format!("{value} mm"))).collect();
        let options = Options { set, ..Options::default() };
        assert_same(point, &analyse(&read_joint("test.toml", catalog::DEMO, &options).unwrap()));
    }
}

#[test]
fn points_of_the_load_are_single_analyses_bit_for_bit() {
    for (ranges, angle, eccentricity) in [
        (&["load.angle=-90:0:5"][..], true, false),
        (&["load.eccentricity=-50:400:5"], false, true),
        (&["load.angle=-90:0:3", "load.eccentricity=0:400:2"], true, true),
    ] {
        for point in &swept(catalog::DEMO, ranges).points {
            let mut joint = template(catalog::DEMO).as_given().clone();
            let wanted = Wanted {
                angle: angle.then(|| point.values[0]),
                eccentricity: eccentricity.then(|| *point.values.last().unwrap()),
            };
            let section = Section::of(&joint.group);
            let turned = |case| varied(case, wanted, section.centroid, section.length).unwrap();
            joint.cases = joint.cases.iter().map(turned).collect();
            assert_same(point, &analyse(&joint));
        }
    }
}

/// The slow variable is the load, so that points of one group do not follow each other.
#[test]
fn a_parameter_and_the_load_vary_together() {
    let found = swept(catalog::DEMO, &["load.angle=-80:-10:2", "depth=180 mm:240 mm:2"]);
    for (index, depth) in ["180 mm", "240 mm", "180 mm", "240 mm"].into_iter().enumerate() {
        let set = vec![("depth".to_owned(), depth.to_owned())];
        let options = Options { set, ..Options::default() };
        let mut joint = read_joint("test.toml", catalog::DEMO, &options).unwrap();
        let angle = found.points[index].values[0];
        let wanted = Wanted { angle: Some(angle), eccentricity: None };
        let section = Section::of(&joint.group);
        let turned = |case| varied(case, wanted, section.centroid, section.length).unwrap();
        joint.cases = joint.cases.iter().map(turned).collect();
        assert_same(&found.points[index], &analyse(&joint));
    }
}

#[test]
fn the_angle_of_a_sweep_is_the_angle_of_a_file() {
    let found = swept(LINES, &["load.angle=60:90:4"]);
    for (point, angle) in found.points.iter().zip(["60", "70", "80", "90"]) {
        let text = LINES.replace("angle = 80", &format!("angle = {angle}"));
        let report = analyse(&read_joint("test.toml", &text, &Options::default()).unwrap());
        let expected = report.cases[0].ultimate().unwrap().governing().load_factor;
        // Turning a force takes a few roundings that writing it does not.
        assert!((ultimate(point) / expected - 1.0).abs() < 1e-9, "{angle}");
    }
}

/// Independent: the values of `reference_points_of_the_method_to_every_digit`, two other programs.
#[test]
fn the_handbook_curve_along_the_eccentricity() {
    let line = format!("[[weld]]\nname = \"NAME\"\nleg = {LEG}\npath = [[0, 0], [0, {LENGTH}]]\n");
    let text = format!(
        "units = \"metric\"\nrules = \"nominal\"\n[filler]\nstrength = 490\n{}{}[[load]]\ncase = \"x\"\n\
         at = [7, 0]\nforce = [0, 1]\n",
        line.replace("NAME", "a"),
        line.replace("NAME", "b")
    );
    let per_length = 0.60 * 490.0 * LEG / 2.0_f64.sqrt() * LENGTH;
    let coefficient = |point: &Point| KIP_PER_INCH * 1000.0 * ultimate(point) / per_length;
    for (range, expected) in [
        ("0.1:0.3:3", vec![(0, "3.72512"), (1, "3.51301"), (2, "3.09159")]),
        ("0.5:3:6", vec![(0, "2.29413"), (1, "1.27636"), (3, "0.654699"), (5, "0.438379")]),
    ] {
        let ends: Vec<f64> = range.split(':').map(|part| part.parse().unwrap()).collect();
        let range = format!("load.eccentricity={}:{}:{}", ends[0] * LENGTH, ends[1] * LENGTH, ends[2]);
        let found = swept(&text, &[&range]);
        for (index, printed) in expected {
            let decimals = printed.split_once('.').unwrap().1.len();
            assert_eq!(format!("{:.decimals$}", coefficient(&found.points[index])), printed);
        }
    }
}

/// Eccentricities of both signs on a group that is its own mirror image carry the same.
#[test]
fn a_mirror_image_carries_the_same() {
    let found = swept(LINES, &["load.eccentricity=-60:60:7"]);
    let straight = swept(&LINES.replace("angle = 80", "angle = 90"), &["load.eccentricity=-60:60:7"]);
    for (index, other) in (0..7).zip((0..7).rev()) {
        let ratio = ultimate(&straight.points[index]) / ultimate(&straight.points[other]);
        assert!((ratio - 1.0).abs() < 1e-9, "{index}");
        // A half turn maps the lines on themselves: it takes a load on one side to one on the other.
        let ratio = ultimate(&found.points[index]) / ultimate(&found.points[other]);
        assert!((ratio - 1.0).abs() < 1e-9, "{index}");
    }
}

/// Independent: 220.96 kN at 2 mm and 246.94 kN at 5 mm, see `several_states_of_two_lines_under_ten_degrees`.
#[test]
fn a_jump_is_reported_where_it_is() {
    let found = swept(LINES, &["load.eccentricity=2:5:2"]);
    let strengths: Vec<String> =
        found.points.iter().map(|point| format!("{:.2}", 100.0 * ultimate(point))).collect();
    assert_eq!(strengths, ["220.96", "246.94"]);
    let [jump] = found.jumps.as_slice() else { panic!("{:?}", found.jumps) };
    assert_eq!((jump.variable, jump.points), (0, [0, 1]));
    assert!(jump.at[0] < jump.at[1] && jump.at[1] - jump.at[0] < 1e-5, "{jump:?}");
    for (at, strength) in jump.at.iter().zip(&jump.strength) {
        let text = LINES.replace("2 mm", &format!("{at} mm"));
        let report = analyse(&read_joint("test.toml", &text, &Options::default()).unwrap());
        let expected = 100e3 * report.cases[0].ultimate().unwrap().governing().load_factor;
        // At the fold the strength has a vertical tangent: roundings of the load count by their root.
        assert!((strength.size / expected - 1.0).abs() < 1e-5, "{jump:?}");
    }
    // The same jump from a finer sweep and from one in two variables, to the width they locate it with.
    for (ranges, width) in [
        (&["load.eccentricity=0:6:13"][..], 1e-5),
        (&["load.angle=70:80:2", "load.eccentricity=2:3:2"], 0.01),
    ] {
        let jumps = swept(LINES, ranges).jumps;
        let same =
            |other: &&Jump| (other.at[0] - jump.at[0]).abs() < width && other.variable == ranges.len() - 1;
        assert_eq!(jumps.iter().filter(same).count(), 1, "{jumps:?}");
    }
}

/// One state at 77 and at 82 degrees, three between: down by 6 %, then up by 3 %. The larger one is found.
#[test]
fn a_jump_between_points_of_one_state_is_found() {
    let found = swept(LINES, &["load.angle=77:82:2"]);
    assert!(found.points.iter().all(|point| only_case(point).states == 1));
    let [jump] = found.jumps.as_slice() else { panic!("{:?}", found.jumps) };
    // Pinned: from a sweep of whole degrees.
    assert!((jump.at[0].to_degrees() - 77.5942).abs() < 1e-3, "{jump:?}");
    assert!((jump.relative_change() + 0.062).abs() < 1e-3, "{jump:?}");
}

#[test]
fn a_load_that_passes_through_zero_is_no_jump() {
    // Nearly symmetric about zero: the load factor has a pole there, the strength has not.
    let text = "units = \"metric\"\nrules = \"nominal\"\n[parameters]\np = \"100 kN\"\n[filler]\nstrength = 490\n\
        [[weld]]\nname = \"left\"\nleg = 6\npath = [[-75, -50], [-75, 50]]\n\
        [[weld]]\nname = \"right\"\nleg = 6\npath = [[75, -50], [75, 50]]\n\
        [[load]]\ncase = \"pull\"\nat = [\"2 mm / cos(10 deg)\", 0]\nforce = [\"p*cos(80 deg)\", \"p*sin(80 deg)\"]\n";
    assert!(swept(text, &["p=-1.0000001kN:1kN:2"]).jumps.is_empty());
}

#[test]
fn a_smooth_curve_has_no_jump() {
    for ranges in [
        &["reach=1 in:30 in:30"][..],
        &["load.angle=-180:180:37"],
        // Through the centroid and beyond: the strength has a peak there.
        &["load.eccentricity=-10:20:13"],
        &["p=-50 kip:50 kip:6", "reach=2 in:6 in:3"],
    ] {
        let found = try_sweep(C, ranges, Some("hoist")).unwrap();
        assert_eq!(found.jumps, [], "{ranges:?}");
    }
}

#[test]
fn one_case_can_be_swept_alone() {
    let faults = try_sweep(C, &["load.angle=0:90:3"], None).unwrap_err();
    assert_eq!(
        faults.iter().map(ToString::to_string).collect::<Vec<_>>(),
        ["--vary: case `twist`: the load has no resultant force that could be turned or shifted; \
          hint: choose a case with a force by `--case`, or vary a parameter"]
    );
    let found = try_sweep(C, &["load.angle=0:90:3"], Some("hoist")).unwrap();
    assert_eq!((found.cases.as_slice(), found.shown), (["hoist".to_owned()].as_slice(), 0));
    let faults = try_sweep(C, &["reach=1 in:2 in:2"], Some("hoisting")).unwrap_err();
    assert_eq!(faults[0].to_string(), "--case: there is no case `hoisting`; accepted: `hoist`, `twist`");
}

#[test]
fn a_point_with_a_fault_does_not_stop_the_others() {
    let found = swept(
        C.replace("leg = \"3/8 in\"", "leg = \"p / (213 kip/in)\"")
            .replace("[0, \"-p\"]", "[0, -80]")
            .as_str(),
        &["p=-80 kip:80 kip:5"],
    );
    let status: Vec<bool> = found.points.iter().map(|point| point.outcome.is_ok()).collect();
    assert_eq!(status, [false, false, false, true, true]);
    assert_eq!((found.verdict(), found.count(Status::NotSolved)), (Status::NotSolved, 3));
    let faults = found.faults();
    assert_eq!(faults.len(), 1, "{faults:?}");
    assert_eq!(faults[0].points, [0, 1, 2]);
    assert!(faults[0].fault.message.contains("greater than zero"), "{faults:?}");
}

#[test]
fn without_a_load_the_utilisation_is_zero_and_nothing_else_is_known() {
    let found = try_sweep(C, &["p=0 kip:80 kip:2"], Some("hoist")).unwrap();
    let idle = only_case(&found.points[0]);
    assert_eq!((idle.utilisation(), idle.status), (Some(0.0), Status::Satisfied));
    assert_eq!((idle.ultimate, idle.demand, idle.ultimate_over_elastic()), (None, None, None));
}

#[test]
fn the_basis_that_decides_may_change_from_point_to_point() {
    let found = swept(&LINES.replace("\"nominal\"", "\"aisc-360-22-lrfd\""), &["load.eccentricity=0:20:3"]);
    let basis = |point: &Point| only_case(point).verification.as_ref().unwrap().basis;
    let found: Vec<Basis> = found.points.iter().map(basis).collect();
    assert_eq!(found, [Basis::Concentric, Basis::Ultimate, Basis::Ultimate]);
}

#[test]
fn the_answer_does_not_depend_on_the_number_of_threads() {
    let run = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
        pool.install(|| swept(C, &["reach=2 in:20 in:5", "p=10 kip:80 kip:2"]))
    };
    assert_eq!(run(1), run(3));
}

#[test]
fn extremes_and_crossings_name_their_points() {
    let found = swept(C, &["reach=2 in:20 in:10"]);
    let ratio = |point: &Point| found.shown_case(point).and_then(PointCase::ultimate_over_elastic).unwrap();
    let extremes = found.extremes().unwrap();
    let ratios: Vec<f64> = found.points.iter().map(ratio).collect();
    assert!(ratios.iter().all(|ratio| *ratio <= extremes.largest.1 && *ratio >= extremes.smallest.1));
    assert!((ratios[extremes.largest.0] - extremes.largest.1).abs() <= 0.0);
    // The headline: 84.2 kip at 10 in against 80 kip; 14 in is exceeded.
    let [crossing] = found.crossings().try_into().unwrap();
    assert_eq!(crossing.points, [4, 5]);
    assert!(crossing.utilisation[0] < 1.0 && crossing.utilisation[1] > 1.0);
    assert_eq!((found.verdict(), found.count(Status::Exceeded)), (Status::Exceeded, 5));
}
