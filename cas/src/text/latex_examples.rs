//! Equations of the field in LaTeX, as people write them, beside the plain notation that they mean.

use super::{LatexLine, Scope, read, read_latex, read_latex_equations};
use crate::expr::Name;

fn name(text: &str) -> Name {
    Name::new(text).expect("a valid name")
}

/// Each formula in LaTeX means the plain one.
fn check(scope: &Scope, examples: &[(&str, &str)]) {
    for (source, plain) in examples {
        let expected = read(plain, scope).unwrap_or_else(|error| panic!("{plain}: {error}"));
        match read_latex(source, scope) {
            Ok(found) => assert_eq!(found, expected, "{source}"),
            Err(error) => panic!("{source}: {error}; {}", error.hint()),
        }
    }
}

#[test]
fn pendulums_and_springs() {
    check(
        &Scope::open(),
        &[
            (
                r"ml^2\ddot\theta + mgl\sin\theta",
                "m*l^2*theta'' + m*g*l*sin(theta)",
            ),
            (
                r"m l^{2}\,\ddot{\theta}+c\,\dot{\theta}+m g l\,\sin\theta",
                "m*l^2*theta'' + c*theta' + m*g*l*sin(theta)",
            ),
            (
                r"\tfrac12 ml^2\dot\theta^2 + mgl(1-\cos\theta)",
                "1/2*m*l^2*theta'^2 + m*g*l*(1 - cos(theta))",
            ),
            (r"$\ddot\varphi + \frac{g}{l}\sin\varphi$", "phi'' + g/l*sin(phi)"),
            (r"\[ -m g l \cos\phi, \]", "-m*g*l*cos(phi)"),
            (
                r"\ddot{\theta}-\Omega^2\sin\theta\cos\theta+\frac gR\sin\theta",
                "theta'' - Omega^2*sin(theta)*cos(theta) + g/R*sin(theta)",
            ),
            (
                r"\frac{d^2\theta}{dt^2}+2\zeta\omega_n\frac{d\theta}{dt}+\omega_n^2\theta",
                "theta'' + 2*zeta*omega_n*theta' + omega_n^2*theta",
            ),
            (
                r"(m_1+m_2)l_1^2\ddot\theta_1+m_2l_1l_2\ddot\theta_2\cos(\theta_1-\theta_2)",
                "(m_1+m_2)*l_1^2*theta_1'' + m_2*l_1*l_2*theta_2''*cos(theta_1-theta_2)",
            ),
            (
                r"m_2 l_1 l_2\dot{\theta}_2^{2}\sin\left(\theta_1-\theta_2\right)",
                "m_2*l_1*l_2*theta_2'^2*sin(theta_1-theta_2)",
            ),
            (
                r"\ddot\theta\sin^2\psi+2\dot\theta\dot\psi\sin\psi\cos\psi",
                "theta''*sin(psi)^2 + 2*theta'*psi'*sin(psi)*cos(psi)",
            ),
            (r"2\pi\sqrt{\frac{l}{g}}", "2*pi*sqrt(l/g)"),
            (
                r"2\pi\sqrt{l/g}\left(1+\frac{\theta_0^2}{16}\right)",
                "2*pi*sqrt(l/g)*(1 + theta_0^2/16)",
            ),
            (
                r"m\left(\ddot r - r\dot\theta^2\right) + k\left(r - r_0\right) - mg\cos\theta",
                "m*(r'' - r*theta'^2) + k*(r - r_0) - m*g*cos(theta)",
            ),
            (r"r\ddot\theta + 2\dot r\dot\theta", "r*theta'' + 2*r'*theta'"),
            (r"mx''+cx'+kx", "m*x'' + c*x' + k*x"),
            (r"m x^{\prime\prime} + c x^{\prime} + k x", "m*x'' + c*x' + k*x"),
            (r"1/2 m v^2 + \frac{1}{2}kx^2", "1/2*m*v^2 + 1/2*k*x^2"),
            (
                r"k x + \alpha x^3 - F_0\cos\omega t",
                "k*x + alpha*x^3 - F_0*cos(omega*t)",
            ),
            (
                r"A e^{-\delta t}\cos(\omega_d t+\varphi_0)",
                "A*exp(-delta*t)*cos(omega_d*t + phi_0)",
            ),
            (r"\mathrm{e}^{-\zeta\omega_0 t}", "exp(-zeta*omega_0*t)"),
            (r"\omega_0\sqrt{1-\zeta^2}", "omega_0*sqrt(1 - zeta^2)"),
            (r"\frac{1}{2\pi}\sqrt{\frac{k}{m}}", "1/(2*pi)*sqrt(k/m)"),
        ],
    );
}

#[test]
fn carts_cranes_and_arms() {
    check(
        &Scope::open(),
        &[
            (
                r"(M+m)\ddot{x}+ml\ddot{\theta}\cos\theta-ml\dot{\theta}^{2}\sin\theta",
                "(M+m)*x'' + m*l*theta''*cos(theta) - m*l*theta'^2*sin(theta)",
            ),
            (
                r"m\ddot x\cos\theta+ml\ddot\theta-mg\sin\theta",
                "m*x''*cos(theta) + m*l*theta'' - m*g*sin(theta)",
            ),
            (
                r"ml\cos\theta\ddot\theta - ml\sin\theta\dot\theta^2",
                "m*l*cos(theta)*theta'' - m*l*sin(theta)*theta'^2",
            ),
            (r"ml\cos\theta\,\ddot{x}", "m*l*cos(theta)*x''"),
            (
                r"\left(m_{\mathrm{t}} + m_{\mathrm{c}}\right) \ddot{x}",
                "(m_t + m_c)*x''",
            ),
            (
                r"\frac{m\sin\theta\,\left(l\dot\theta^2-g\cos\theta\right)}{M+m\sin^2\theta}",
                "m*sin(theta)*(l*theta'^2 - g*cos(theta))/(M + m*sin(theta)^2)",
            ),
            (
                r"\bigl(J_1+J_2+2m_2 a_1 a_2\cos q_2\bigr)\ddot q_1",
                "(J_1 + J_2 + 2*m_2*a_1*a_2*cos(q_2))*q_1''",
            ),
            (
                r"-m_2a_1a_2\sin q_2\left(2\dot q_1\dot q_2+\dot q_2^2\right)"
                    .replace("q_2\\left", "q_2\\,\\left")
                    .as_str(),
                "-m_2*a_1*a_2*sin(q_2)*(2*q_1'*q_2' + q_2'^2)",
            ),
            (
                r"[m_1 a_1 + m_2 (a_1+a_2)] g \cos q_1",
                "(m_1*a_1 + m_2*(a_1+a_2))*g*cos(q_1)",
            ),
            (r"\Bigl[ m \{ x + (y - z) \} \Bigr]^2", "(m*(x + (y - z)))^2"),
            (
                r"l\ddot\varphi+2\dot l\dot\varphi+g\sin\varphi",
                "l*phi'' + 2*l'*phi' + g*sin(phi)",
            ),
            (r"\dot{x}_{\text{max}} - v_{max}", "x_max' - v_max"),
            (r"x + l \sin \varphi \qquad", "x + l*sin(phi)"),
            (
                r"\sin^{2}(\theta_1+\theta_2)+\cos^2 2\theta",
                "sin(theta_1+theta_2)^2 + cos(2*theta)^2",
            ),
            (r"9.81\times m \cdot \sin 30", "9.81*m*sin(30)"),
            (r"0.5\,\rho\,c_w\,A\,\dot{x}^2", "0.5*rho*c_w*A*x'^2"),
            (
                r"F_{1,2} - F_{21} + F_{\alpha} + \lambda_{i}",
                "F_1_2 - F_21 + F_alpha + lambda_i",
            ),
            (
                r"\frac{m_1 - m_2}{m_1 + m_2 + J/R^2}g",
                "(m_1 - m_2)/(m_1 + m_2 + J/R^2)*g",
            ),
        ],
    );
}

#[test]
fn rotors_tops_and_others() {
    check(
        &Scope::open(),
        &[
            (
                r"m\ddot x+c\dot x+kx-me\Omega^2\cos\Omega t",
                "m*x'' + c*x' + k*x - m*e*Omega^2*cos(Omega*t)",
            ),
            (
                r"\frac{A}{2}\left(\dot\theta^2+\dot\psi^2\sin^2\theta\right)+\frac{C}{2}\left(\dot\varphi+\dot\psi\cos\theta\right)^2",
                "A/2*(theta'^2 + psi'^2*sin(theta)^2) + C/2*(phi' + psi'*cos(theta))^2",
            ),
            (r"A\dot p-(B-C)qr", "A*p' - (B - C)*q*r"),
            (
                r"\dot{\omega}_1 - \frac{I_2-I_3}{I_1}\omega_2\omega_3",
                "omega_1' - (I_2-I_3)/I_1*omega_2*omega_3",
            ),
            (r"\frac{1}{\sqrt{1-\eta^2}}", "(1 - eta^2)^(-1/2)"),
            (r"\sqrt[3]{\frac{3J}{4\rho}}", "(3*J/(4*rho))^(1/3)"),
            (
                r"x^{1/2}+y^{\frac{3}{2}}+z^{-1}+u^\frac12+v^{-0.5}",
                "x^(1/2)+y^(3/2)+z^(-1)+u^(1/2)+v^(-1/2)",
            ),
            (
                r"\dddot x - \ddddot{y} + {z}^{\left(5\right)} + w_1^{(3)}",
                "x''' - y'''' + z''''' + w_1'''",
            ),
            (
                r"x'_1 + x_1'' + q^2_1 + {\dot q}_1^2",
                "x_1' + x_1'' + q_1^2 + q_1'^2",
            ),
            (
                r"\sin\frac{\theta}{2}\cos\tfrac12\theta\tan\pi x",
                "sin(theta/2)*cos(1/2*theta)*tan(pi*x)",
            ),
            (r"\sinh x", "(exp(x) - exp(-x))/2"),
            (r"a\cosh\left(\frac{x}{a}\right)", "a*(exp(x/a) + exp(-(x/a)))/2"),
            (r"\tanh x", "(exp(x) - exp(-x))/(exp(x) + exp(-x))"),
            (
                r"\cot\alpha+\sec\alpha-\csc\alpha",
                "cos(alpha)/sin(alpha) + 1/cos(alpha) - 1/sin(alpha)",
            ),
            (r"\exp(-ct)\ln\frac{r_2}{r_1}", "exp(-c*t)*ln(r_2/r_1)"),
            (r"\operatorname{sin}x+\mathrm{cos}\,y", "sin(x) + cos(y)"),
            (r"\mathit{rope} - \mathrm{ml}\,g", "rope - ml*g"),
            (
                r"\ddot{\dot x}+\dot{x_1}+\dot{\mathrm{ab}}_2",
                "x''' + x_1' + ab_2'",
            ),
            (
                r"\frac{\mathrm{d}x}{\mathrm{d}t}-\frac{d^{2}x_1}{dt^{2}}-\frac{d\dot x}{dt}",
                "x' - x_1'' - x''",
            ),
            (r"k\,x\! % the spring", "k*x"),
            (r"\frac{a}{bc}/d", "a/(b*c)/d"),
            (r"(ab)(c)d\cdot2^{3}", "a*b*c*d*8"),
            (r"v_{\text{abs}} - v_\mathrm{so}", "v_abs - v_so"),
            (r"\frac{F}{dt}", "F/(d*t)"),
            (r"φ + θ'", "φ + θ'"),
        ],
    );
}

#[test]
fn declared_names_settle_which_letters_are_one() {
    let symbols = ["m", "l", "ml", "phi1", "q_1_2", "e", "x", "d", "rate"].map(name);
    let scope = Scope::of(symbols, [(name("U"), 1), (name("F"), 2)]);
    check(
        &scope,
        &[
            ("mlx", "ml*x"),
            ("m l x", "m*l*x"),
            ("lml", "l*ml"),
            ("ratex", "rate*x"),
            (r"\dot{ml}+\dot{\varphi}_1", "ml' + phi1'"),
            (r"q_{1,2}+\ddot q_{1,2}", "q_1_2 + q_1_2''"),
            ("e^{2}x+d", "e^2*x + d"),
            (r"\mathrm{e}^{2}", "exp(2)"),
            (r"U(x)^2-mU'(x)", "U(x)^2 - m*U'(x)"),
            (r"\ddot U\left(m x\right)", "U''(m*x)"),
            (
                r"F(x,l)-F^{\left(1,2\right)}\left(x, m+l\right)",
                "F(x,l) - F[1,2](x, m+l)",
            ),
            (r"U^{(4)}(x)+m(x+l)", "U''''(x) + m*(x+l)"),
            (r"\sin U(x)", "sin(U(x))"),
        ],
    );
}

fn lines(source: &str) -> Vec<LatexLine> {
    match read_latex_equations(source, &Scope::open()) {
        Ok(lines) => lines,
        Err(error) => panic!("{source}: {error}; {}", error.hint()),
    }
}

/// The sides of each line in plain notation, and whether it goes on with the line before.
fn check_lines(source: &str, expected: &[(bool, &[&str])]) {
    let found = lines(source);
    assert_eq!(found.len(), expected.len(), "{source}: {found:?}");
    for (line, (continued, sides)) in found.iter().zip(expected) {
        let sides: Vec<_> = sides
            .iter()
            .map(|side| read(side, &Scope::open()).expect("plain notation"))
            .collect();
        assert_eq!((line.continued, &line.sides), (*continued, &sides), "{source}");
    }
}

#[test]
fn equations_are_split_into_lines_and_sides() {
    check_lines("a &= b &= c & + d", &[(false, &["a", "b", "c + d"])]);
    check_lines("m\\ddot x = F", &[(false, &["m*x''", "F"])]);
    check_lines(
        r"\begin{align*}
            m\ddot{x} &= -k x, \label{eq:one} \\[2pt]
            J\ddot{\varphi} &= -c\dot\varphi \tag{2} \nonumber
        \end{align*}",
        &[(false, &["m*x''", "-k*x"]), (false, &["J*phi''", "-c*phi'"])],
    );
    check_lines(
        r"\begin{equation}\begin{split} T &= \frac12 m\dot x^2 \\ &\quad {}+ \tfrac12 J\dot\theta^2\end{split}.\end{equation}",
        &[(false, &["T", "1/2*m*x'^2 + 1/2*J*theta'^2"])],
    );
    check_lines(
        r"\begin{aligned} L_{1} {}& = T - V \\ &= \tfrac{1}{2} m v^2 - mgh \end{aligned}",
        &[(false, &["L_1", "T - V"]), (true, &["1/2*m*v^2 - m*g*h"])],
    );
    check_lines(
        r"$$ x = \left( a \right. \\ \left. + b \right) c = y $$",
        &[(false, &["x", "(a + b)*c", "y"])],
    );
    check_lines("m\\ddot x \\\\ + kx = 0.", &[(false, &["m*x'' + k*x", "0"])]);
    check_lines(
        "a = b \\\\ -c = d \\\\ - e",
        &[(false, &["a", "b"]), (false, &["-c", "d - e"])],
    );
    check_lines("a = \\\\ b - \\\\ &\\quad c", &[(false, &["a", "b - c"])]);
    check_lines("x \\\\ y \\\\", &[(false, &["x"]), (false, &["y"])]);
    assert_eq!(lines("a = b \\\\ c = d")[1].place, 10);
}

#[test]
fn what_is_written_on_several_lines_is_read_as_one_equation() {
    use super::{Arrangement, latex_equation};
    use crate::expr::sin;
    let terms = (1..12).map(|i| {
        let [m, x] =
            ["m", "x"].map(|text| crate::Expr::symbol(&format!("{text}_{i}")).expect("a valid name"));
        m * sin(x) - x
    });
    let right = crate::Expr::sum_of(terms);
    let written = latex_equation("L", "=", right, 20, &Arrangement::default());
    assert!(written.contains("\\\\"), "{written}");
    let found = lines(&written);
    assert_eq!(found.len(), 1, "{written}");
    assert_eq!(found[0].sides[1], right, "{written}");
}
