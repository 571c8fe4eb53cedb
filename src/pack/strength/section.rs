//! From the parts of a design to the sections whose strength is looked at.

use std::f64::consts::FRAC_PI_4;

use crate::design::Design;
use crate::geometry::{ArcPath, Curve, Point, follow_with_arcs};
use crate::pack::PackError;
use crate::parts::{Core, Laminate, PlyMaterial};
use crate::section::Side;
use crate::strength::{
    CoreElastic, FlapCut, Layer, Layup, Member, MemberStation, PlyElastic, SectionBuild, SkinPly, SkinSides,
    outline_points,
};
use crate::wing::{StationShape, Wing};

/// Longest stretch between two sections, as a share of the free length.
const STRETCH: f64 = 1.0 / 24.0;
/// A ply, a flap or a cut begins and ends between two sections that lie this near to each other, mm.
const JUMP: f64 = 0.05;
/// Nearness of the outlines to the design, mm: a hundredth of a skin.
const TOLERANCE: f64 = 0.01;

/// The part, from where it is held outwards, and its sections' outlines.
pub(super) fn member(design: &Design, wing: &Wing, others: &[f64]) -> Result<Member, PackError> {
    let held = design.strength.held_to.mm();
    let stations = places(design, others).into_iter().map(|at| {
        let build = build(design, wing, at)?;
        Ok(MemberStation { at: at - held, build })
    });
    Ok(Member::new(stations.collect::<Result<_, PackError>>()?)?)
}

/// Where sections are looked at, mm from the root: stations, where something begins or ends, the places of
/// loads and joints, and as many between as it takes.
fn places(design: &Design, others: &[f64]) -> Vec<f64> {
    let (held, reach) = (design.strength.held_to.mm(), design.reach().mm());
    let plies = design.plies.iter().flat_map(|ply| [ply.from, ply.to]);
    let cuts = design.cuts.iter().flat_map(|cut| [cut.from, cut.to]);
    let flap = design.flap.iter().flat_map(|flap| [flap.from, flap.to]);
    let jumps = plies.chain(cuts).chain(flap).flat_map(|at| [at.mm() - JUMP, at.mm() + JUMP]);
    let plain = design.stations.iter().map(|station| station.at.mm()).chain(others.iter().copied());
    let mut places: Vec<f64> = jumps.chain(plain).filter(|at| *at > held && *at < reach).collect();
    places.extend([held, reach]);
    sort(&mut places);
    let longest = STRETCH * (reach - held);
    let between = |pair: &[f64]| {
        let (from, step) = (pair[0], pair[1] - pair[0]);
        let parts = (step / longest - 1e-6).ceil().max(1.0);
        (1..parts as usize).map(move |i| from + step * i as f64 / parts).collect::<Vec<_>>()
    };
    let more: Vec<f64> = places.windows(2).flat_map(between).collect();
    places.extend(more);
    sort(&mut places);
    places
}

/// In rising order; of two that are nearer than a jump is wide one does.
fn sort(places: &mut Vec<f64>) {
    places.sort_by(f64::total_cmp);
    places.dedup_by(|a, b| *a - *b < 0.5 * JUMP);
}

/// The outline of the laminate: the finished one less filler and paint, in the foil's axes.
pub(super) fn laminate_outline(design: &Design, shape: &StationShape<'_>) -> Result<ArcPath, PackError> {
    let finish = Laminate { plies: Vec::new(), ..design.skin() };
    let failed = |source| PackError::Shape { at: shape.at, source };
    let path = if finish.finish > 0.0 {
        follow_with_arcs(&Core::of(shape, &finish)?, TOLERANCE)
    } else {
        follow_with_arcs(shape, TOLERANCE)
    };
    Ok(path.map_err(failed)?.transformed(shape.to_foil()))
}

/// What the part is made of at a place, in the foil's axes, so that all sections share one origin.
fn build(design: &Design, wing: &Wing, at: f64) -> Result<SectionBuild, PackError> {
    let core = design.strength.core.clone().ok_or(PackError::NoMaterials)?;
    let shape = wing.shape_at(at)?;
    let (skin, to_foil) = (design.skin(), shape.to_foil());
    let hinge = design.hinge_at(at, shape.chord);
    let wood = if design.cuts_at(at).next().is_some() { Some(Core::of(&shape, &skin)?) } else { None };
    let cut_outs = design.cuts_at(at).filter_map(|(_, cut)| {
        let taken = cut.of(wood.as_ref()?).taken;
        Some(taken.into_iter().map(|corner| to_foil * corner).collect::<Vec<_>>())
    });
    let laid = design.plies.iter().zip(&skin.plies).filter(|(_, laid)| laid.span.contains(&at));
    let plies = laid.map(|(ply, laid)| {
        Ok(SkinPly {
            layer: layer(design, ply, laid.thickness)?,
            sides: match laid.covers {
                crate::parts::Covers::Both => SkinSides::Both,
                crate::parts::Covers::Upper => SkinSides::One(Side::Upper),
                crate::parts::Covers::Lower => SkinSides::One(Side::Lower),
            },
            chord: laid.chord.clone(),
        })
    });
    let plies: Vec<SkinPly> = plies.collect::<Result<_, PackError>>()?;
    let flap = hinge.map(|hinge| {
        let at = hinge.main_body_ends_at(&shape, &skin);
        let [upper, lower] = shape.roots_at(at).map(|root| shape.jet(root).point);
        let there = |ply: &&SkinPly| ply.chord.contains(&(at / shape.chord));
        let layers: Vec<Layer> = plies.iter().filter(there).map(|ply| ply.layer.clone()).collect();
        let stiffness = Layup::new(layers).map_or(0.0, |skin| skin.constants().gxy * skin.thickness());
        let web = web(design, &core, stiffness, upper.distance(lower), hinge.face);
        FlapCut { at: at * shape.twist.cos(), web }
    });
    // A slot or a bore behind the parting is the flap's.
    let ends = flap.as_ref().map_or(f64::INFINITY, |flap| shape.nose.x + flap.at);
    let cut_outs = cut_outs.filter(|hole: &Vec<Point>| hole.iter().all(|corner| corner.x < ends)).collect();
    Ok(SectionBuild {
        outline: outline_points(&laminate_outline(design, &shape)?),
        nose: shape.nose.x,
        chord: shape.chord * shape.twist.cos(),
        plies,
        core,
        cut_outs,
        flap,
    })
}

/// A ply of the design as a layer, with the density of its own fibre and resin.
pub(super) fn layer(design: &Design, ply: &crate::design::Ply, thickness: f64) -> Result<Layer, PackError> {
    let material =
        ply.material.and_then(|i| design.strength.materials.get(i)).ok_or(PackError::NoMaterials)?;
    let cloth = PlyMaterial {
        areal_weight: ply.weight,
        fibre_density: ply.fibre_density,
        resin_density: ply.resin_density,
        fibre_share: ply.fibre_share,
    };
    let material = PlyElastic { density: cloth.density(), ..material.elastic.clone() };
    Ok(Layer { material, angle: ply.angle.radians(), thickness })
}

/// What closes the section at a flap's cut face: its plies, laid on the bias, as far as their material is named, over a strip
/// of the wood.
///
/// Behind an open edge the skins hand their shear to each other through the core within a length
/// √(G t d / 2 Gc), G t of a skin, d the height and Gc the core's shear modulus: the shear lag of a sandwich
/// strip under torque, q'' = 2 Gc q / (G t d), worked out here. A strip of wood as thick is as stiff.
fn web(design: &Design, core: &CoreElastic, skin: f64, height: f64, face: f64) -> Vec<Layer> {
    let strip = (skin * height / (2.0 * core.g)).sqrt().min(height);
    // It is held against shear alone: the skins break along the span before the wood does.
    let wood = PlyElastic {
        nu12: 0.0,
        g12: core.g,
        shear: core.shear,
        ..PlyElastic::isotropic(&core.name, core.provenance, [core.along_span, 0.0], [1e6; 3], core.density)
    };
    let material = design.flap.and_then(|flap| flap.face_material);
    let material = material.and_then(|i| design.strength.materials.get(i)).filter(|_| face > 0.0);
    let plies = material.map(|m| Layer { material: m.elastic.clone(), angle: FRAC_PI_4, thickness: face });
    std::iter::once(Layer { material: wood, angle: 0.0, thickness: strip }).chain(plies).collect()
}
