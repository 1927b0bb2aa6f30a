//! Configuration factors of Howell's catalogue shapes, by independent
//! quadrature (scipy, 2e-13) that agrees with the catalogue's closed forms.

use farglow::physics::region::Region;
use farglow::physics::scene::{Barrier, Part, Scene};
use farglow::physics::view_factor::{self, disc, rectangle, sphere};
use glam::DVec3;

use crate::rows::{self, Row};

/// The factor of a region that faces the element at the origin.
fn seen(region: &Region, normal: DVec3) -> f64 {
    region
        .view(DVec3::ZERO)
        .into_view()
        .expect("the element lies off the source")
        .factor(normal)
}

/// A disc that turns its emitting face to the origin.
fn facing_disc(centre: DVec3, axis: DVec3, radius: f64) -> Region {
    let normal = if centre.dot(axis) > 0.0 { -axis } else { axis };
    Region::disc(centre, normal, radius).expect("a possible disc")
}

/// A polygon that turns its emitting face to the origin.
fn facing_polygon(vertices: Vec<DVec3>) -> Region {
    let region = Region::polygon(vertices.clone()).expect("a possible polygon");
    if region.normal().expect("flat").dot(vertices[0]) < 0.0 {
        return region;
    }
    Region::polygon(vertices.into_iter().rev().collect()).expect("a possible polygon")
}

pub fn disc_axis(row: &Row) -> Option<f64> {
    disc::from_coaxial_element(row.number("R_m"), row.number("h_m")).ok()
}

pub fn disc_parallel(row: &Row) -> Option<f64> {
    disc::from_parallel_element(row.number("R_m"), row.number("h_m"), row.number("offset_m")).ok()
}

pub fn disc_perpendicular(row: &Row) -> Option<f64> {
    disc::from_perpendicular_element(row.number("R_m"), row.number("h_m"), row.number("offset_m"))
        .ok()
}

pub fn disc_pose(row: &Row) -> Option<f64> {
    let region = facing_disc(
        row.vector("center_m"),
        row.vector("axis"),
        row.number("R_m"),
    );
    Some(seen(&region, row.vector("receiver_normal")))
}

pub fn ring(row: &Row) -> Option<f64> {
    let normal = row.vector("receiver_normal");
    let disc = |name| facing_disc(row.vector("center_m"), row.vector("axis"), row.number(name));
    Some(seen(&disc("r_out_m"), normal) - seen(&disc("r_in_m"), normal))
}

pub fn sphere_tilt(row: &Row) -> Option<f64> {
    sphere::from_tilted_element(
        row.number("R_over_d"),
        1.0,
        row.number("tilt_deg").to_radians(),
    )
    .ok()
}

pub fn disc_axis_tilt(row: &Row) -> Option<f64> {
    let tilt = row.number("tilt_deg").to_radians();
    let region = facing_disc(DVec3::Z, DVec3::Z, row.number("R_over_h"));
    Some(seen(&region, DVec3::new(tilt.sin(), 0.0, tilt.cos())))
}

pub fn cylinder(row: &Row) -> Option<f64> {
    let point = DVec3::new(
        row.number("axis_distance_m"),
        0.0,
        row.number("height_of_element_m"),
    );
    let region =
        Region::cylinder(DVec3::ZERO, DVec3::Z * row.number("H_m"), row.number("R_m")).ok()?;
    let view = region.view(point).into_view()?;
    Some(view.factor(row.vector("receiver_normal")))
}

pub fn rect_parallel_corner(row: &Row) -> Option<f64> {
    rectangle::from_parallel_element_at_corner(
        row.number("a_m"),
        row.number("b_m"),
        row.number("c_m"),
    )
    .ok()
}

pub fn rect_perpendicular_corner(row: &Row) -> Option<f64> {
    rectangle::from_perpendicular_element_at_corner(
        row.number("height_m"),
        row.number("width_m"),
        row.number("distance_m"),
    )
    .ok()
}

pub fn rect_pose(row: &Row) -> Option<f64> {
    let (corner, first, second) = (
        row.vector("corner_m"),
        row.vector("edge1_m"),
        row.vector("edge2_m"),
    );
    let region = facing_polygon(vec![
        corner,
        corner + first,
        corner + first + second,
        corner + second,
    ]);
    Some(seen(&region, row.vector("receiver_normal")))
}

pub fn polygon(row: &Row) -> Option<f64> {
    let vertices = row.inputs["vertices_m"]
        .as_array()?
        .iter()
        .map(rows::vector)
        .collect();
    Some(seen(
        &facing_polygon(vertices),
        row.vector("receiver_normal"),
    ))
}

/// The infinite strip as one of 2 × 10⁷ m: what is missing is below 1e-13.
pub fn strip(row: &Row) -> Option<f64> {
    let at = |name| {
        let angle = row.number(name).to_radians();
        DVec3::new(angle.sin(), 0.0, angle.cos())
    };
    let (first, second) = (at("angle1_deg"), at("angle2_deg"));
    let far = DVec3::Y * 1e7;
    Some(seen(
        &facing_polygon(vec![first - far, second - far, second + far, first + far]),
        DVec3::Z,
    ))
}

pub fn disc_disc(row: &Row) -> Option<f64> {
    disc::to_coaxial_disc(row.number("R1_m"), row.number("R2_m"), row.number("h_m")).ok()
}

pub fn rect_rect_parallel(row: &Row) -> Option<f64> {
    rectangle::to_parallel_rectangle(
        row.number("a_m"),
        row.number("b_m"),
        row.number("distance_m"),
    )
    .ok()
}

pub fn rect_rect_perpendicular(row: &Row) -> Option<f64> {
    rectangle::to_perpendicular_rectangle(
        row.number("common_edge_m"),
        row.number("w1_m"),
        row.number("w2_m"),
    )
    .ok()
}

/// Source: double boundary integral; catalogue C-41 (number from memory); family `disc_disc`.
#[test]
fn disc_to_coaxial_disc() {
    assert_eq!(rows::check("disc_disc", disc_disc), 4);
}

/// Source: adaptive quadrature, agreeing with the closed form to 1e-12; family `rect_rect_parallel`.
#[test]
fn rectangle_to_parallel_rectangle() {
    assert_eq!(rows::check("rect_rect_parallel", rect_rect_parallel), 4);
}

/// Source: Gauss quadrature after Duffy's transformation; family `rect_rect_perpendicular`.
#[test]
fn rectangle_to_perpendicular_rectangle() {
    assert_eq!(
        rows::check("rect_rect_perpendicular", rect_rect_perpendicular),
        3
    );
}

/// Source: catalogue, element to coaxial parallel disc (B-12, number from memory); family `disc_axis`.
#[test]
fn coaxial_disc() {
    assert_eq!(rows::check("disc_axis", disc_axis), 4);
}

/// Source: catalogue, element to parallel disc off its axis; family `disc_parallel`.
#[test]
fn parallel_disc() {
    assert_eq!(rows::check("disc_parallel", disc_parallel), 5);
}

/// Source: catalogue, element perpendicular to a disc, none of it behind; family `disc_perpendicular`.
#[test]
fn perpendicular_disc() {
    assert_eq!(rows::check("disc_perpendicular", disc_perpendicular), 4);
}

/// Source: quadrature of the part in front of the element's plane; family `disc_perpendicular_cut`.
#[test]
fn perpendicular_disc_cut_by_the_horizon() {
    assert_eq!(rows::check("disc_perpendicular_cut", disc_perpendicular), 3);
}

/// Source: quadrature after horizon clipping; family `disc_pose`.
#[test]
fn disc_in_any_pose() {
    assert_eq!(rows::check("disc_pose", disc_pose), 5);
}

/// Source: quadrature; family `ring`, as the difference of two discs.
#[test]
fn ring_is_the_difference_of_two_discs() {
    assert_eq!(rows::check("ring", ring), 3);
    let closed = |row: &Row| {
        let on_axis =
            row.vector("center_m") == DVec3::Z && row.vector("receiver_normal") == DVec3::Z;
        let (inner, outer) = (row.number("r_in_m"), row.number("r_out_m"));
        let factor = view_factor::ring::from_coaxial_element(inner, outer, 1.0);
        on_axis.then(|| factor.expect("a possible ring"))
    };
    assert_eq!(rows::check("ring", closed), 1);
}

/// Source: quadrature; family `ring`, as what a disc shows round a smaller one
/// left out of it, and past a smaller one that hides it.
#[test]
fn ring_is_what_remains_round_a_disc() {
    assert_eq!(rows::check("ring", |row| past(row, false)), 3);
    assert_eq!(rows::check("ring", |row| past(row, true)), 3);
}

/// The ring as a scene: the inner disc left out, or hidden by one half as far
/// away and half as large.
fn past(row: &Row, hidden: bool) -> Option<f64> {
    let (centre, axis) = (row.vector("center_m"), row.vector("axis"));
    let outer = facing_disc(centre, axis, row.number("r_out_m"));
    let inner = row.number("r_in_m");
    let (part, barriers) = if hidden {
        let near = facing_disc(centre * 0.5, axis, 0.5 * inner);
        (Part::bare(outer), vec![Barrier::solid(near)])
    } else {
        let less = Some(facing_disc(centre, axis, inner));
        let part = Part {
            less,
            ..Part::bare(outer)
        };
        (part, Vec::new())
    };
    let looked = Scene::new(vec![part], barriers).ok()?.look(DVec3::ZERO);
    let normal = row.vector("receiver_normal");
    let glimpses = looked.glimpses().iter();
    Some(glimpses.map(|glimpse| glimpse.view.factor(normal)).sum())
}

/// Source: quadrature, and closed forms where there are any; family `cylinder`.
#[test]
fn cylinder_from_any_height() {
    assert_eq!(rows::check("cylinder", cylinder), 7);
}

/// Source: catalogue, tilted element to sphere, quadrature where the horizon cuts; family `sphere_tilt`.
#[test]
fn sphere_at_any_tilt() {
    assert_eq!(rows::check("sphere_tilt", sphere_tilt), 17);
}

/// Source: a disc on the axis fills the same cone as a sphere; family `disc_axis_tilt`.
#[test]
fn disc_on_the_axis_at_any_tilt() {
    assert_eq!(rows::check("disc_axis_tilt", disc_axis_tilt), 8);
}

/// Source: catalogue, element opposite a corner, parallel (B-3 family, from memory); family `rect_parallel_corner`.
#[test]
fn parallel_rectangle_from_its_corner() {
    assert_eq!(rows::check("rect_parallel_corner", rect_parallel_corner), 4);
}

/// Source: catalogue, element in the floor before a standing rectangle; family `rect_perpendicular_corner`.
#[test]
fn standing_rectangle_from_its_corner() {
    assert_eq!(
        rows::check("rect_perpendicular_corner", rect_perpendicular_corner),
        4
    );
}

/// Source: quadrature after horizon clipping; family `rect_pose`.
#[test]
fn rectangle_in_any_pose() {
    assert_eq!(rows::check("rect_pose", rect_pose), 4);
}

/// Source: area quadrature after horizon clipping; family `polygon`.
#[test]
fn polygon_in_any_pose() {
    assert_eq!(rows::check("polygon", polygon), 3);
}

/// Source: infinitely long strip, exact, (sin b − sin a)/2; family `strip`, by the closed form and as a long rectangle.
#[test]
fn long_strip() {
    assert_eq!(rows::check("strip", strip), 3);
    let closed = |row: &Row| {
        let at = |name| row.number(name).to_radians();
        view_factor::strip::from_element(at("angle1_deg"), at("angle2_deg")).ok()
    };
    assert_eq!(rows::check("strip", closed), 3);
}

/// Source: the same closed rows by the other way: discs, spheres and rectangles of the closed forms as regions in space, to 1e-12.
#[test]
fn regions_in_space_give_the_closed_forms() {
    for row in rows::all() {
        let floor = |radius: f64, height: f64, offset: f64| {
            Region::disc(DVec3::new(offset, 0.0, height), DVec3::NEG_Z, radius)
                .expect("a possible disc")
        };
        let corner = |x: f64, y: f64, z: f64| DVec3::new(x, y, z);
        let (found, expected) = match row.family.as_str() {
            "disc_axis" => (
                seen(&floor(row.number("R_m"), row.number("h_m"), 0.0), DVec3::Z),
                disc_axis(&row),
            ),
            "disc_parallel" => (
                seen(
                    &floor(row.number("R_m"), row.number("h_m"), row.number("offset_m")),
                    DVec3::Z,
                ),
                disc_parallel(&row),
            ),
            "disc_perpendicular" | "disc_perpendicular_cut" => (
                seen(
                    &floor(row.number("R_m"), row.number("h_m"), row.number("offset_m")),
                    DVec3::X,
                ),
                disc_perpendicular(&row),
            ),
            "sphere_tilt" => {
                let tilt = row.number("tilt_deg").to_radians();
                let region =
                    Region::sphere(DVec3::Z, row.number("R_over_d")).expect("a possible sphere");
                (
                    seen(&region, DVec3::new(0.0, tilt.sin(), tilt.cos())),
                    sphere_tilt(&row),
                )
            }
            "rect_parallel_corner" => {
                let (a, b, c) = (row.number("a_m"), row.number("b_m"), row.number("c_m"));
                let region = facing_polygon(vec![
                    corner(0.0, 0.0, c),
                    corner(a, 0.0, c),
                    corner(a, b, c),
                    corner(0.0, b, c),
                ]);
                (seen(&region, DVec3::Z), rect_parallel_corner(&row))
            }
            "rect_perpendicular_corner" => {
                let (a, b, c) = (
                    row.number("height_m"),
                    row.number("width_m"),
                    row.number("distance_m"),
                );
                let region = facing_polygon(vec![
                    corner(c, 0.0, 0.0),
                    corner(c, b, 0.0),
                    corner(c, b, a),
                    corner(c, 0.0, a),
                ]);
                (seen(&region, DVec3::Z), rect_perpendicular_corner(&row))
            }
            "polygon" => {
                let vertices: Vec<DVec3> = row.inputs["vertices_m"]
                    .as_array()
                    .expect("a list")
                    .iter()
                    .map(rows::vector)
                    .collect();
                let there = view_factor::polygon::from_element(
                    vertices.clone(),
                    row.vector("receiver_normal"),
                );
                let back = view_factor::polygon::from_element(
                    vertices.into_iter().rev().collect(),
                    row.vector("receiver_normal"),
                );
                (
                    there.expect("a polygon") + back.expect("a polygon"),
                    polygon(&row),
                )
            }
            _ => continue,
        };
        let expected = expected.expect("the row runs");
        assert!(
            (found - expected).abs() < 1e-12,
            "{}: {found} in space, {expected} closed",
            row.id
        );
    }
}
