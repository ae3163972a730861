//! A draw from the quantity's own law: exact where nothing depends on it.

use super::{Chain, Trouble};
use crate::program::{OwnElements, Program};

/// The forward draw of one quantity.
#[derive(Clone, Debug)]
pub struct ForwardRule {
    /// The quantity's own law.
    pub own: OwnElements,
}

impl ForwardRule {
    /// Draws every element.
    pub fn update(&mut self, program: &Program, chain: &mut Chain) -> Result<(), Trouble> {
        for element in 0..self.own.len() {
            let value = self.own.draw(program, chain, element);
            let place = self.own.place(element);
            if !value.is_finite() {
                return Err(Trouble {
                    place,
                    value: chain.state.values[place],
                    what: "a draw from its own law",
                });
            }
            chain.state.values[place] = value;
        }
        program.refresh(self.own.quantity, chain);
        Ok(())
    }
}
