//! A small writer of ASCII DXF, release 2010 (AC1024), with every table and object a strict reader asks for.
//!
//! It shares no line with the reader under test, so that a drawing made here is a second opinion.
//! Lengths are millimetres, angles are radians until they are written (DXF wants degrees).

mod binary;
mod entities;
mod measure;
mod objects;
mod older;
mod records;
mod shapes;
mod tables;
mod tags;

pub(crate) use binary::binary;
pub(crate) use older::older;
pub(crate) use shapes::{Across, Shape, Text, Up};

use measure::Measure;
use tags::Tags;

/// A point or a vector in plan, millimetres.
pub(crate) type Xy = [f64; 2];

/// A layer of the layer table.
pub(crate) struct Layer {
    pub(crate) name: String,
    /// Index into the usual palette of colours, 1 to 255.
    pub(crate) colour: u8,
    pub(crate) linetype: &'static str,
    pub(crate) frozen: bool,
}

/// A shape on a layer.
pub(crate) struct Entity {
    pub(crate) layer: String,
    pub(crate) shape: Shape,
}

/// A named block with its base point at the origin.
pub(crate) struct Block {
    pub(crate) name: String,
    pub(crate) entities: Vec<Entity>,
}

/// A drawing being put together: layers, blocks, and what lies in model space and on the sheet.
#[derive(Default)]
pub(crate) struct Drawing {
    pub(crate) layers: Vec<Layer>,
    pub(crate) blocks: Vec<Block>,
    pub(crate) model: Vec<Entity>,
    pub(crate) paper: Vec<Entity>,
    /// Opposite corners of everything worth seeing, for the saved view.
    pub(crate) extents: [Xy; 2],
}

impl Drawing {
    /// Adds a layer unless one of that name is there.
    pub(crate) fn layer(&mut self, name: &str, colour: u8, linetype: &'static str) {
        if !self.layers.iter().any(|layer| layer.name == name) {
            self.layers.push(Layer {
                name: name.to_owned(),
                colour,
                linetype,
                frozen: false,
            });
        }
    }

    /// Freezes the layers whose names end so.
    pub(crate) fn freeze(&mut self, suffix: &str) {
        for layer in self
            .layers
            .iter_mut()
            .filter(|layer| layer.name.ends_with(suffix))
        {
            layer.frozen = true;
        }
    }

    /// Adds a block; the shapes lie on the layers named.
    pub(crate) fn block(&mut self, name: &str, shapes: Vec<(&str, Shape)>) {
        let entities = shapes
            .into_iter()
            .map(|(layer, shape)| Entity {
                layer: layer.to_owned(),
                shape,
            })
            .collect();
        self.blocks.push(Block {
            name: name.to_owned(),
            entities,
        });
    }

    /// Draws a shape in model space.
    pub(crate) fn draw(&mut self, layer: &str, shape: Shape) {
        self.model.push(Entity {
            layer: layer.to_owned(),
            shape,
        });
    }

    /// Draws an aligned dimension with the block that shows it; `shift_mm` is how far its line stands to the left of `from`-`to`.
    pub(crate) fn dimension(
        &mut self,
        layer: &str,
        from: Xy,
        to: Xy,
        shift_mm: f64,
        height_mm: f64,
    ) {
        let name = format!("*D{}", self.blocks.len() + 1);
        let measure = Measure::new(name.clone(), from, to, shift_mm, height_mm);
        self.block(
            &name,
            measure
                .picture()
                .into_iter()
                .map(|shape| ("0", shape))
                .collect(),
        );
        self.draw(layer, Shape::Dimension(measure));
    }

    /// The whole file as text, the same for the same drawing.
    pub(crate) fn to_dxf(&self) -> String {
        let block_names = ["*Model_Space", "*Paper_Space"]
            .into_iter()
            .chain(self.blocks.iter().map(|block| block.name.as_str()))
            .collect::<Vec<_>>();
        let mut tags = Tags::new(&block_names);
        tags.section("TABLES");
        tables::write(&mut tags, self, &block_names);
        tags.end_section();
        tags.section("BLOCKS");
        for (index, name) in block_names.iter().enumerate() {
            let entities = index
                .checked_sub(2)
                .map_or(&[][..], |own| &self.blocks[own].entities);
            block(&mut tags, name, entities);
        }
        tags.end_section();
        tags.section("ENTITIES");
        for entity in &self.model {
            entities::write(&mut tags, entity, "*Model_Space");
        }
        for entity in &self.paper {
            entities::write(&mut tags, entity, "*Paper_Space");
        }
        tags.end_section();
        tags.section("OBJECTS");
        objects::write(&mut tags, self.extents);
        tags.end_section();
        tags.put(0, "EOF");
        let body = tags.finish();
        self.header(body.next_handle) + &body.text
    }

    /// Goes first in the file but knows the last handle, so it is written last.
    fn header(&self, next_handle: u64) -> String {
        let [least, most] = self.extents;
        let mut head = Tags::new(&[]);
        head.section("HEADER");
        head.put(9, "$ACADVER").put(1, "AC1024");
        head.put(9, "$DWGCODEPAGE").put(3, "ANSI_1252");
        head.put(9, "$INSBASE").xyz(10, [0.0, 0.0]);
        head.put(9, "$EXTMIN").xyz(10, least);
        head.put(9, "$EXTMAX").xyz(10, most);
        head.put(9, "$LIMMIN").xy(10, least);
        head.put(9, "$LIMMAX").xy(10, most);
        head.put(9, "$LTSCALE").real(40, 1.0);
        head.put(9, "$TEXTSTYLE").put(7, "Standard");
        head.put(9, "$CLAYER").put(8, "0");
        head.put(9, "$DIMSTYLE").put(2, "Standard");
        head.put(9, "$HANDSEED").put(5, format!("{next_handle:X}"));
        head.put(9, "$MEASUREMENT").put(70, 1);
        head.put(9, "$INSUNITS").put(70, 4);
        head.end_section();
        head.finish().text
    }
}

fn block(tags: &mut Tags, name: &str, entities: &[Entity]) {
    let [record, begin, end] = tags.block_handles(name);
    let paper = name == "*Paper_Space";
    tags.put(0, "BLOCK")
        .handle(5, begin)
        .handle(330, record)
        .put(100, "AcDbEntity");
    if paper {
        tags.put(67, 1);
    }
    tags.put(8, "0").put(100, "AcDbBlockBegin").put(2, name);
    tags.put(70, i32::from(name.starts_with("*D")));
    tags.xyz(10, [0.0, 0.0]).put(3, name).put(1, "");
    for entity in entities {
        entities::write(tags, entity, name);
    }
    tags.put(0, "ENDBLK")
        .handle(5, end)
        .handle(330, record)
        .put(100, "AcDbEntity");
    if paper {
        tags.put(67, 1);
    }
    tags.put(8, "0").put(100, "AcDbBlockEnd");
}
