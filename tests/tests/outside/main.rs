//! Derived equations, accelerations and reactions, and verdicts on identities, against published ones.

mod accelerations;
mod equations;
mod identities;
mod planted;
mod reference;
mod steps;

use tests::published::all;

#[test]
fn every_system_is_stated_completely() {
    let systems = all();
    assert!(systems.len() >= 18, "only {} systems", systems.len());
    for system in systems {
        let model = system.sheet.model();
        model
            .require_complete()
            .unwrap_or_else(|error| panic!("{}: {error}", system.source));
        let coordinates = model.coordinates().len();
        for probe in &system.probes {
            assert_eq!(probe.accelerations.len(), coordinates, "{}", system.source);
        }
    }
}
