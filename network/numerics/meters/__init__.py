"""Current meters: tow runs to a rating, revolutions and seconds to a velocity."""
