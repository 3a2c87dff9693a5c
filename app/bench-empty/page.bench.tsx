// Part of the bench's build only: what every page ships before it shows anything.
export default function Page() {
  return (
    <main>
      <h1>Empty</h1>
    </main>
  )
}
