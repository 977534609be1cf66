//! The states of a chain's banks that an envelope covers.

use rand_chacha::ChaCha8Rng;
use rand_chacha::rand_core::Rng;

use super::unit;
use crate::plan::{Plan, Switches};

/// All states of the banks of a chain.
#[derive(Clone, Debug)]
pub(super) struct States {
    /// For each bank, radio side first, the word with all of its steps on.
    all_on: Vec<u16>,
}

impl States {
    pub(super) fn of(plan: &Plan) -> Self {
        Self {
            all_on: plan.banks().map(|(_, bank)| bank.all_on()).collect(),
        }
    }

    /// Whether there is only one state, because there is no bank.
    pub(super) fn is_single(&self) -> bool {
        self.all_on.is_empty()
    }

    /// The state at this place: all steps off, then all on, then random ones.
    pub(super) fn draw(&self, index: u64, random: &mut ChaCha8Rng) -> Switches {
        let mut switches = Switches::OFF;
        for (word, all_on) in switches.words.iter_mut().zip(&self.all_on) {
            *word = match index {
                0 => 0,
                1 => *all_on,
                _ => (random.next_u64() >> 48) as u16 & all_on,
            };
        }
        switches
    }

    /// Every other time, the same with one step of one bank switched over.
    pub(super) fn flip(&self, switches: &mut Switches, random: &mut ChaCha8Rng) {
        if self.is_single() || unit(random) < 0.5 {
            return;
        }
        let steps: u32 = self.all_on.iter().map(|word| word.count_ones()).sum();
        let mut pick = (unit(random) * f64::from(steps)) as u32;
        for (word, all_on) in switches.words.iter_mut().zip(&self.all_on) {
            if pick < all_on.count_ones() {
                *word ^= 1 << pick;
                return;
            }
            pick -= all_on.count_ones();
        }
    }
}
