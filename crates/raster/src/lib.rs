//! egui's triangles as a picture, on the CPU: gamma space, premultiplied alpha, bilinear textures, top-left rule.
//! Pictures are the same on every run, with or without a GPU.

#![allow(clippy::disallowed_methods)] // Colours are this crate's matter.

use std::collections::HashMap;

use eframe::egui::epaint::{ClippedPrimitive, ImageData, Mesh, Primitive, Vertex};
use eframe::egui::{Color32, ColorImage, Pos2, Rect, TextureId, TexturesDelta, Vec2, pos2};
use image::RgbaImage;

/// The textures that were handed over so far.
#[derive(Default)]
pub struct Raster {
    textures: HashMap<TextureId, ColorImage>,
}

impl Raster {
    /// Takes over what is new in the textures.
    pub fn take(&mut self, delta: &mut TexturesDelta) {
        for (id, images) in delta.set.drain() {
            for change in images {
                let ImageData::Color(image) = &change.image;
                match (change.pos, self.textures.get_mut(&id)) {
                    (Some([x, y]), Some(whole)) => patch(whole, image, x, y),
                    _ => _ = self.textures.insert(id, image.as_ref().clone()),
                }
            }
        }
        for id in delta.free.drain() {
            self.textures.remove(&id);
        }
    }

    /// Paints; sizes in points, times `pixels_per_point`.
    #[must_use]
    pub fn paint(&self, primitives: &[ClippedPrimitive], size: Vec2, pixels_per_point: f32) -> RgbaImage {
        let size = size * pixels_per_point;
        let mut picture =
            ColorImage::filled([size.x.round() as usize, size.y.round() as usize], Color32::TRANSPARENT);
        for ClippedPrimitive { clip_rect, primitive } in primitives {
            if let Primitive::Mesh(mesh) = primitive
                && let Some(texture) = self.textures.get(&mesh.texture_id)
            {
                paint_mesh(&mut picture, mesh, texture, *clip_rect * pixels_per_point, pixels_per_point);
            }
        }
        RgbaImage::from_fn(picture.size[0] as u32, picture.size[1] as u32, |x, y| {
            image::Rgba(picture[(x as usize, y as usize)].to_srgba_unmultiplied())
        })
    }
}

fn patch(whole: &mut ColorImage, part: &ColorImage, left: usize, top: usize) {
    for y in 0..part.size[1] {
        for x in 0..part.size[0] {
            whole[(left + x, top + y)] = part[(x, y)];
        }
    }
}

fn paint_mesh(picture: &mut ColorImage, mesh: &Mesh, texture: &ColorImage, clip: Rect, scale: f32) {
    let whole = Rect::from_min_size(Pos2::ZERO, Vec2::new(picture.size[0] as f32, picture.size[1] as f32));
    let clip = Rect::from_min_max(clip.min.round(), clip.max.round()).intersect(whole);
    for corners in mesh.indices.chunks_exact(3) {
        let [a, b, c] = [corners[0], corners[1], corners[2]].map(|index| {
            let vertex = mesh.vertices[index as usize];
            Vertex { pos: (vertex.pos.to_vec2() * scale).to_pos2(), ..vertex }
        });
        // One winding for all, so that the edge rule is the same on both sides of a shared edge.
        let twice_area = edge(a.pos, b.pos, c.pos);
        if twice_area > 0.0 {
            paint_triangle(picture, [a, b, c], twice_area, texture, clip);
        } else if twice_area < 0.0 {
            paint_triangle(picture, [a, c, b], -twice_area, texture, clip);
        }
    }
}

fn paint_triangle(
    picture: &mut ColorImage,
    corners: [Vertex; 3],
    twice_area: f32,
    texture: &ColorImage,
    clip: Rect,
) {
    let [a, b, c] = corners;
    let bounds = Rect::from_points(&[a.pos, b.pos, c.pos]).intersect(clip);
    if !bounds.is_positive() {
        return;
    }
    let (columns, rows) = (bounds.x_range(), bounds.y_range());
    for y in rows.min.floor() as usize..(rows.max.ceil() as usize).min(clip.max.y as usize) {
        for x in columns.min.floor() as usize..(columns.max.ceil() as usize).min(clip.max.x as usize) {
            let at = pos2(x as f32 + 0.5, y as f32 + 0.5);
            let weights = [edge(b.pos, c.pos, at), edge(c.pos, a.pos, at), edge(a.pos, b.pos, at)];
            let edges = [(b.pos, c.pos), (c.pos, a.pos), (a.pos, b.pos)];
            let is_inside = weights.iter().zip(edges).all(|(w, e)| *w > 0.0 || (*w == 0.0 && is_top_left(e)));
            if !is_inside || !clip.contains(at) {
                continue;
            }
            let [wa, wb, wc] = weights.map(|w| w / twice_area);
            let uv = (a.uv.to_vec2() * wa + b.uv.to_vec2() * wb + c.uv.to_vec2() * wc).to_pos2();
            let texel = sample(texture, uv);
            let mut source = [0.0; 4];
            for (channel, value) in source.iter_mut().enumerate() {
                let of = |vertex: &Vertex| f32::from(vertex.color.to_array()[channel]);
                *value = (wa * of(&a) + wb * of(&b) + wc * of(&c)) / 255.0 * texel[channel];
            }
            let under = &mut picture[(x, y)];
            let old = under.to_array();
            let blend = |i: usize| (source[i] + f32::from(old[i]) * (1.0 - source[3] / 255.0)).round() as u8;
            *under = Color32::from_rgba_premultiplied(blend(0), blend(1), blend(2), blend(3));
        }
    }
}

/// Twice the signed area of the triangle; positive where `at` lies on the inner side.
fn edge(from: Pos2, to: Pos2, at: Pos2) -> f32 {
    (to.x - from.x) * (at.y - from.y) - (to.y - from.y) * (at.x - from.x)
}

/// A pixel centre on an edge belongs to one of its two triangles only.
fn is_top_left((from, to): (Pos2, Pos2)) -> bool {
    let along = to - from;
    along.y < 0.0 || (along.y == 0.0 && along.x > 0.0)
}

/// Bilinear, clamped at the edge; channels 0 to 255.
fn sample(texture: &ColorImage, uv: Pos2) -> [f32; 4] {
    let [width, height] = texture.size;
    let (x, y) = (uv.x * width as f32 - 0.5, uv.y * height as f32 - 0.5);
    let (right, down) = (x - x.floor(), y - y.floor());
    let at = |dx: f32, dy: f32| {
        let column = (x.floor() + dx).clamp(0.0, width as f32 - 1.0) as usize;
        let row = (y.floor() + dy).clamp(0.0, height as f32 - 1.0) as usize;
        texture[(column, row)].to_array().map(f32::from)
    };
    let (a, b, c, d) = (at(0.0, 0.0), at(1.0, 0.0), at(0.0, 1.0), at(1.0, 1.0));
    std::array::from_fn(|i| {
        let (upper, lower) = (a[i] + right * (b[i] - a[i]), c[i] + right * (d[i] - c[i]));
        upper + down * (lower - upper)
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn two_triangles_make_a_square_without_a_seam() {
        let mut raster = Raster::default();
        let mut delta = TexturesDelta::default();
        let white = ColorImage::filled([1, 1], Color32::WHITE);
        let options = eframe::egui::TextureOptions::default();
        delta
            .set
            .entry(TextureId::default())
            .or_default()
            .push(eframe::egui::epaint::ImageDelta::full(white, options));
        raster.take(&mut delta);
        let mut mesh = Mesh::default();
        let half = Color32::from_rgba_premultiplied(100, 0, 0, 128);
        mesh.add_colored_rect(Rect::from_min_max(pos2(2.0, 2.0), pos2(6.0, 6.0)), half);
        let clip_rect = Rect::EVERYTHING;
        let square = ClippedPrimitive { clip_rect, primitive: Primitive::Mesh(mesh) };
        let picture = raster.paint(&[square], Vec2::splat(8.0), 1.0);
        for (x, y, pixel) in picture.enumerate_pixels() {
            let expected = if (2..6).contains(&x) && (2..6).contains(&y) { 128 } else { 0 };
            assert_eq!(pixel.0[3], expected, "{x}, {y}");
        }
    }
}
