//! Sections flow down the pages.

use super::block::{Block, baseline_mm, label};
use super::density::Density;
use super::furniture;
use crate::model::Identity;
use crate::request::Paper;
use crate::scene::Scene;
use crate::tokens::{Ink, Stroke, TextStyle, space};

/// Blocks under one head.
pub(crate) struct Section {
    /// What it is called.
    pub title: String,
    /// Beside the title: units, scales. Its items stand to the left of its origin.
    pub aside: Block,
    /// Column heads, repeated where the section continues.
    pub columns: Option<Block>,
    /// What follows, each on one page.
    pub blocks: Vec<Block>,
}

impl Section {
    /// Height of a title with its rule, mm.
    pub const TITLE_MM: f64 = 6.2;

    /// Height where nothing is broken, mm.
    pub fn height_mm(&self) -> f64 {
        self.head_height_mm() + self.blocks.iter().map(|block| block.height_mm).sum::<f64>()
    }

    /// Height of the head and the first block, mm.
    pub fn least_height_mm(&self) -> f64 {
        self.head_height_mm() + self.blocks.first().map_or(0.0, |block| block.height_mm)
    }

    fn head_height_mm(&self) -> f64 {
        Self::TITLE_MM + self.columns.as_ref().map_or(0.0, |columns| columns.height_mm)
    }

    fn head(&self, width_mm: f64, is_continued: bool) -> Block {
        let mut block = Block::empty(self.head_height_mm());
        block.rule(0.0, width_mm, 0.0, Stroke::Support, Ink::Text);
        let title = if is_continued { format!("{}, continued", self.title) } else { self.title.clone() };
        block.text(0.0, TITLE_DROP_MM, label(TextStyle::Section, title));
        let drop_mm = TITLE_DROP_MM + baseline_mm(TextStyle::Section) - baseline_mm(TextStyle::Note);
        block.add(self.aside.clone(), width_mm, drop_mm);
        if let Some(columns) = &self.columns {
            block.add(columns.clone(), 0.0, Self::TITLE_MM);
        }
        block
    }
}

/// From the rule to the title, mm.
const TITLE_DROP_MM: f64 = 1.0;

/// Pages being filled.
pub(crate) struct Flow<'a> {
    paper: Paper,
    identity: &'a Identity,
    density: Density,
    pages: Vec<Scene>,
    y_mm: f64,
    bottom_mm: f64,
}

impl<'a> Flow<'a> {
    pub fn new(paper: Paper, identity: &'a Identity, density: Density) -> Self {
        let (_, height_mm) = paper.size_mm();
        let bottom_mm = height_mm - space::MARGIN - furniture::FOOT_MM;
        let mut flow = Self { paper, identity, density, pages: Vec::new(), y_mm: 0.0, bottom_mm };
        flow.next_page();
        flow
    }

    /// Width between the margins, mm.
    pub fn width_mm(&self) -> f64 {
        self.paper.size_mm().0 - 2.0 * space::MARGIN
    }

    /// What is left of the page, mm.
    pub fn room_mm(&self) -> f64 {
        self.bottom_mm - self.y_mm
    }

    pub fn is_on_first_page(&self) -> bool {
        self.pages.len() == 1
    }

    pub fn next_page(&mut self) {
        let (width_mm, height_mm) = self.paper.size_mm();
        let mut page = Scene::new(width_mm, height_mm);
        let head = if self.pages.is_empty() {
            furniture::front_head(self.identity, &self.density, self.width_mm())
        } else {
            furniture::running_head(self.identity, self.width_mm())
        };
        self.y_mm = space::MARGIN + head.height_mm;
        page.items.extend(head.items.into_iter().map(|item| item.moved(space::MARGIN, space::MARGIN)));
        self.pages.push(page);
    }

    pub fn place(&mut self, section: Section) {
        let width_mm = self.width_mm();
        if section.least_height_mm() > self.room_mm() {
            self.next_page();
        }
        self.put(section.head(width_mm, false));
        let continued = section.head(width_mm, true);
        for block in section.blocks {
            if block.height_mm > self.room_mm() {
                self.next_page();
                self.put(continued.clone());
            }
            self.put(block);
        }
        self.y_mm += self.density.section;
    }

    /// Puts a block at the foot of the page.
    pub fn place_at_foot(&mut self, block: Block) {
        if block.height_mm > self.room_mm() {
            self.next_page();
        }
        self.y_mm = self.bottom_mm - block.height_mm - space::CELL;
        self.put(block);
    }

    fn put(&mut self, block: Block) {
        let y_mm = self.y_mm;
        if let Some(page) = self.pages.last_mut() {
            page.items.extend(block.items.into_iter().map(|item| item.moved(space::MARGIN, y_mm)));
        }
        self.y_mm += block.height_mm;
    }

    /// The pages, with their feet.
    pub fn finish(self) -> Vec<Scene> {
        let width_mm = self.width_mm();
        let count = self.pages.len();
        let (identity, bottom_mm) = (self.identity, self.bottom_mm);
        self.pages
            .into_iter()
            .enumerate()
            .map(|(index, mut page)| {
                let foot = furniture::foot(identity, width_mm, index + 1, count);
                page.items.extend(foot.items.into_iter().map(|item| item.moved(space::MARGIN, bottom_mm)));
                page
            })
            .collect()
    }
}
