//! A distribution with its modifiers.

use super::cursor::{Cursor, Read};
use crate::syntax::tree::{DistributionSyntax, Modifier, ModifierKind};

impl Cursor<'_> {
    /// What stands behind `follows`.
    pub(super) fn distribution(&mut self) -> Read<DistributionSyntax> {
        let start = self.span();
        let call = self.expression("after `follows`: a distribution")?;
        let mut modifiers = vec![];
        while let Some(kind) = self.modifier()? {
            modifiers.push(kind);
        }
        Ok(DistributionSyntax { span: start.to(self.before()), call, modifiers })
    }

    fn modifier(&mut self) -> Read<Option<Modifier>> {
        let start = self.span();
        let kind = if self.take_word("between").is_some() {
            let (low, high) = self.ends()?;
            ModifierKind::Between(low, high)
        } else if self.take_word("above").is_some() {
            ModifierKind::Above(self.end("after `above`")?)
        } else if self.take_word("below").is_some() {
            ModifierKind::Below(self.end("after `below`")?)
        } else if self.take_word("known").is_some() {
            self.expect_word("between", "after `known`")?;
            let (low, high) = self.ends()?;
            ModifierKind::KnownBetween(low, high)
        } else if self.take_word("censored").is_some() {
            let below = self.take_word("below").is_some();
            if !below {
                self.expect_word("above", "after `censored`: `below` or `above`")?;
            }
            let limit = self.end("as the limit of `censored`")?;
            self.expect_word("when", "after the limit of `censored`")?;
            let flag = self.expression("after `when`")?;
            if below {
                ModifierKind::CensoredBelow(limit, flag)
            } else {
                ModifierKind::CensoredAbove(limit, flag)
            }
        } else {
            return Ok(None);
        };
        Ok(Some(Modifier { span: start.to(self.before()), kind }))
    }

    #[allow(clippy::type_complexity)]
    fn ends(
        &mut self,
    ) -> Read<(
        crate::arena::Id<crate::syntax::tree::Expression>,
        crate::arena::Id<crate::syntax::tree::Expression>,
    )> {
        let low = self.end("after `between`")?;
        self.expect_word("and", "between the ends of `between`")?;
        let high = self.end("after `and`")?;
        Ok((low, high))
    }
}
