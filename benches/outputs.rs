//! What a drawing costs, beside the analysis it shows.
//!
//! | bench | measures | why it matters |
//! |---|---|---|
//! | `analyse demo` | the analysis of the demonstration joint | what a drawing is measured against |
//! | `joint demo` | its SVG | redrawn on every change of a file |
//! | `joint of 200 welds` | an SVG of many welds | the placing of texts must not grow out of hand |
//! | `curves`, `maps` | SVG of a sweep of 31 points, of 26 x 19 points | |
//! | `png demo` | rasterising | the dearest step: two dots to the px of the page |

use criterion::{Criterion, criterion_group, criterion_main};
use std::hint::black_box;
use weldpole::analysis::{Report, analyse};
use weldpole::input::{Options, Template, catalog, read_joint};
use weldpole::output::{joint_svg, sweep_svg};
use weldpole::study::sweep::{Sweep, sweep};

fn report(text: &str) -> Report {
    analyse(&read_joint("bench.toml", text, &Options::default()).expect("a joint without faults"))
}

/// Invented: ten rows of twenty welds.
fn grid() -> String {
    let mut text =
        "units = \"metric\"\nrules = \"nominal\"\n[filler]\nstrength = 490\n[[load]]\ncase = \"wind\"\n\
                    at = [1500, 300]\nforce = [20, -2000]\n"
            .to_owned();
    for index in 0..200 {
        let (x, y) = (index % 20 * 60, index / 20 * 60);
        text += &format!("[[weld]]\nname = \"s{index}\"\nleg = 6\npath = [[{x}, {y}], [{x}, {}]]\n", y + 40);
    }
    text
}

fn swept(vary: &[&str]) -> Sweep {
    let template =
        Template::read("demo.toml", catalog::DEMO, &Options::default()).expect("the demonstration");
    let texts: Vec<String> = vary.iter().map(|text| (*text).to_owned()).collect();
    let variables = template.variables(&texts).expect("variables of the demonstration");
    sweep(&template, &variables, None, &|_| ()).expect("a load with a force")
}

fn drawings(criterion: &mut Criterion) {
    let mut group = criterion.benchmark_group("drawing");
    let joint = read_joint("demo.toml", catalog::DEMO, &Options::default()).expect("the demonstration");
    group.bench_function("analyse demo", |bencher| bencher.iter(|| analyse(black_box(&joint))));
    let (demo, many) = (report(catalog::DEMO), report(&grid()));
    let draw = |report: &Report| joint_svg(report, report.deciding_case().expect("a case"));
    group.bench_function("joint demo", |bencher| bencher.iter(|| draw(black_box(&demo))));
    group.bench_function("joint of 200 welds", |bencher| bencher.iter(|| draw(black_box(&many))));
    let curves = swept(&["load.eccentricity=0:600:31"]);
    let maps = swept(&["load.eccentricity=0:500:26", "load.angle=-90:90:19"]);
    group.bench_function("curves", |bencher| bencher.iter(|| sweep_svg(black_box(&curves))));
    group.bench_function("maps", |bencher| bencher.iter(|| sweep_svg(black_box(&maps))));
    #[cfg(feature = "png")]
    {
        let svg = draw(&demo);
        group.sample_size(20);
        group.bench_function("png demo", |bencher| {
            bencher.iter(|| weldpole::output::png(black_box(&svg)).expect("a drawing"));
        });
    }
    group.finish();
}

criterion_group!(benches, drawings);
criterion_main!(benches);
