//! One joint under one case as a drawing: the group to scale, loads, both methods' forces, the verdict.
//!
//! | part | file |
//! |---|---|
//! | what is drawn, and what lies too far off | `subject.rs` |
//! | welds as bands, coloured by deformation ratio | `bands.rs` |
//! | sizes of the welds in words | `welds.rs` |
//! | force on every piece of weld by both methods | `forces.rs` |
//! | loads, line of action, eccentricity | `loads.rs` |
//! | centroid, centre of rotation, critical points | `marks.rs` |
//! | measures | `dimensions.rs` |
//! | numbers, verdict, remarks; key | `panel.rs`, `key.rs` |
//!
//! The drawing is made twice: first to learn how far the arrows reach on the page, then with room for them.

mod bands;
mod dimensions;
mod forces;
mod key;
mod loads;
mod marks;
mod panel;
mod subject;
mod welds;

use super::canvas::{Area, Canvas, Spot};
use super::sheet;
use super::space::Space;
use super::view::View;
use crate::analysis::{CaseReport, Report};
use crate::model::AppliedLoad;
use crate::output::number::length;
use crate::output::words;
use crate::solvers::Ultimate;
use dimensions::Dimensions;
use forces::Forces;
use panel::Notes;
use subject::Subject;

/// Size of the page, px.
const PAGE: (f64, f64) = (1200.0, 940.0);
/// Where the group is drawn.
const FRAME: [f64; 4] = [24.0, 98.0, 838.0, 880.0];
/// Where the numbers stand.
const PANEL: [f64; 4] = [852.0, 98.0, 1176.0, 880.0];
/// Room around the group for labels, px.
const MARGIN: f64 = 34.0;
/// Half the least width of a band, px.
const WIDENED: Spot = Spot::new(4.0, 4.0);
/// Room around the centre of rotation for its mark, px.
const MARK: f64 = 13.0;

/// A case of a report as an SVG drawing.
#[must_use]
pub fn joint_svg(report: &Report, case: &CaseReport) -> String {
    let canvas = drawn(report, case);
    let title = words::title(report);
    let (verdict, _) = words::verdict(report);
    let description = format!(
        "{title}, case {}: {verdict}, {}. Weld group to scale with loads, centre of rotation and the forces of the \
         ultimate and the elastic method.",
        case.name,
        words::deciding(report)
    );
    canvas.finish(title, &description)
}

fn drawn(report: &Report, case: &CaseReport) -> Canvas {
    let mut canvas = Canvas::new(PAGE.0, PAGE.1);
    let subject = Subject::new(report, case);
    let (verdict, emphasis) = words::verdict(report);
    sheet::head(&mut canvas, Some((verdict, emphasis)), words::title(report), &words::deciding(report));
    let frame = Area::new(FRAME[0], FRAME[1], FRAME[2], FRAME[3]);
    let (view, forces, dimensions, group) = laid_out(&subject, &frame);
    let mut space = Space::new(frame);
    let mut notes = Notes::default();
    bands::draw(&mut canvas, &mut space, &subject, &view);
    forces::draw(&mut canvas, &mut space, &forces);
    marks::draw(&mut canvas, &mut space, &subject, &view);
    dimensions.draw(&mut canvas, &mut space, &subject, &view, &group);
    notes.loads = loads::draw(&mut canvas, &mut space, &subject, &view);
    let pointer = marks::label(&mut canvas, &mut space, &subject, &view);
    let missed = welds::label(&mut canvas, &mut space, &subject, &view);
    notes.remarks = remarks(&subject, &view, missed);
    notes.remarks.extend(pointer);
    let panel = Area::new(PANEL[0], PANEL[1], PANEL[2], PANEL[3]);
    panel::draw(&mut canvas, &panel, &subject, &forces, &notes);
    sheet::foot(&mut canvas, &report.joint);
    canvas
}

/// The view, the arrows, the rows of measures, and the part of the page that welds and arrows fill.
fn laid_out(subject: &Subject<'_>, frame: &Area) -> (View, Forces, Dimensions, Area) {
    let dimensions = Dimensions::of(subject);
    let (before, after) = dimensions.room();
    let margin = Spot::new(MARGIN, MARGIN);
    let about = subject.centroid();
    let first = View::fit(&subject.needs(before + margin, after + margin), about, frame);
    let (before_arrows, after_arrows) = overhang(subject, &first, &forces::arrows(subject, &first));
    let room = margin * 0.6;
    let needs = subject.needs(before + before_arrows + room, after + after_arrows + room);
    let view = View::fit(&needs, about, frame);
    let forces = forces::arrows(subject, &view);
    let (before, after) = overhang(subject, &view, &forces);
    let bands = bands_on_page(subject, &view);
    let mut group = Area { least: bands.least - before, most: bands.most + after };
    // Measures keep off the centre of rotation, lest they seem to lead to it.
    if let Some(centre) = subject.near_centre() {
        let mark = Area::around(view.spot(centre), Spot::new(2.0 * MARK, 2.0 * MARK));
        group = Area { least: group.least.inf(&mark.least), most: group.most.sup(&mark.most) };
    }
    // So do they off the arrows of moments at the welds.
    let turn = loads::TURN + 4.0;
    for load in subject.loads().iter().filter(|load| load.wrench.moment.z.abs() > 0.0) {
        let arrow = Area::around(view.spot(subject.place_of_moment(load)), Spot::new(2.0 * turn, 2.0 * turn));
        if arrow.overlaps(&bands) {
            group = Area { least: group.least.inf(&arrow.least), most: group.most.sup(&arrow.most) };
        }
    }
    (view, forces, dimensions, group)
}

/// How far arrows, and bands drawn wider than to scale, reach beyond the bands to scale, px.
fn overhang(subject: &Subject<'_>, view: &View, forces: &Forces) -> (Spot, Spot) {
    let bands = bands_on_page(subject, view);
    let (mut before, mut after) = (WIDENED, WIDENED);
    for arrow in &forces.arrows {
        before = before.sup(&(bands.least - arrow.tip));
        after = after.sup(&(arrow.tip - bands.most));
    }
    (before, after)
}

/// The part of the page that the bands fill when they are to scale.
fn bands_on_page(subject: &Subject<'_>, view: &View) -> Area {
    let half = subject.half_band();
    let (one, other) = (view.spot(subject.least - half), view.spot(subject.most + half));
    Area { least: one.inf(&other), most: one.sup(&other) }
}

/// What a reader must know about the drawing and the case.
fn remarks(subject: &Subject<'_>, view: &View, missed: usize) -> Vec<String> {
    let joint = subject.joint();
    let mut remarks = Vec::new();
    if let Some(reason) = subject.case.not_solved() {
        remarks.push(format!("Ultimate analysis: {reason}."));
    }
    if let Some(ultimate) = subject.case.ultimate() {
        remarks.extend(about_states(ultimate));
    }
    if bands::widened(joint, view) {
        remarks.push("Welds are drawn wider than to scale.".to_owned());
    }
    if missed == joint.group.welds().len() {
        remarks.push("Too many welds to write a size at each.".to_owned());
    } else if missed > 0 {
        let noun = if missed == 1 { "weld has" } else { "welds have" };
        remarks.push(format!("{missed} {noun} no size at it for want of room."));
    }
    if subject.report.deciding_case().is_some_and(|case| !std::ptr::eq(case, subject.case)) {
        remarks.push("Another case decides the joint; the verdict above is the joint's.".to_owned());
    }
    let is_far = |load: &&AppliedLoad| Subject::has_place(load) && !subject.is_in_place(load);
    let far = subject.loads().iter().filter(is_far);
    if subject.draws_each_load() && far.count() > 0 {
        let distance = length(joint.units, subject.size());
        remarks.push(format!(
            "A force far from the group ({distance} across) is drawn at the rim, a moment at the centroid."
        ));
    }
    remarks
}

fn about_states(ultimate: &Ultimate) -> Vec<String> {
    let mut remarks = Vec::new();
    if ultimate.incomplete {
        remarks
            .push("A smaller state is possible: the search saw signs of one it could not find.".to_owned());
    }
    if ultimate.states.len() > 1 {
        remarks.push(format!(
            "{} equilibrium states at first rupture; the smallest is drawn.",
            ultimate.states.len()
        ));
    }
    remarks
}
