const TRACES =
  "M156 372V223l46 -46H900M156 628V777l46 46H900M220 400V242l46 -46H900M220 600V758l46 46H900M284 356V261l46 -46H900M284 644V739l46 46H900M348 386V280l46 -46H900M348 614V720l46 46H900" +
  "M412 364V299l46 -46H900M412 636V701l46 46H900M476 406V318l46 -46H900M476 594V682l46 46H900M540 378V337l46 -46H900M540 622V663l46 46H900M604 394V356l46 -46H900M604 606V644l46 46H900";
const PINS =
  "M142 372h28v62h-28zM142 566h28v62h-28zM206 400h28v34h-28zM206 566h28v34h-28zM270 356h28v78h-28zM270 566h28v78h-28zM334 386h28v48h-28zM334 566h28v48h-28z" +
  "M398 364h28v70h-28zM398 566h28v70h-28zM462 406h28v28h-28zM462 566h28v28h-28zM526 378h28v56h-28zM526 566h28v56h-28zM590 394h28v40h-28zM590 566h28v40h-28z";

/** The logo, large: a chip seen from above whose two pin rows are equal. */
export function SignInArt() {
  return (
    <svg className="absolute inset-0 h-full w-full phone:hidden" viewBox="0 0 760 1000" preserveAspectRatio="xMidYMid slice" aria-hidden="true">
      <path d={TRACES} fill="none" stroke="var(--mask-line)" strokeWidth="3" />
      <path d={PINS} fill="var(--pad)" />
      <path d="M112 434H648V566H112V524a24 24 0 0 0 0 -48Z" fill="var(--mask-deep)" stroke="var(--silk)" strokeWidth="3" />
      <circle cx="142" cy="540" r="7" fill="var(--silk)" />
      <text x="176" y="521" fontFamily="var(--mono)" fill="var(--silk)" fontSize="60" fontWeight="600" letterSpacing="-1">TWINREAD</text>
    </svg>
  );
}
